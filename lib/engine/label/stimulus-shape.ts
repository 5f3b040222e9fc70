import { EngineError } from '@/lib/engine/engine-error';

/** One trial's stimulus: velocity of location k on axis a at frame t is velocity[(k·nAxes + a)·nFrames + t], in deg/s. */
export interface StimulusShape {
  nLocations: number;
  nAxes: number;
  nFrames: number;
}

/**
 * Checks a stimulus' shape: at least 2 locations (one alone has nothing to share), 1 axis and 2 frames.
 * Mutates nothing; throws EngineError. Constant cost.
 */
export function requireStimulusShape(shape: StimulusShape): void {
  const { nLocations, nAxes, nFrames } = shape;
  if (![nLocations, nAxes, nFrames].every((count) => Number.isInteger(count) && count > 0)) {
    throw new EngineError('shapeMismatch', 'Locations, axes and frames must be whole positive numbers');
  }
  if (nLocations < 2) {
    throw new EngineError(
      'notEstimable',
      'The stimulus has one location: how much motion is shared between locations cannot be worked out from one',
    );
  }
  if (nFrames < 2) {
    throw new EngineError('notEstimable', 'The stimulus has one frame: motion needs at least two');
  }
}
