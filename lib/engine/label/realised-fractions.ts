import { EngineError } from '@/lib/engine/engine-error';
import {
  realisedFraction,
  type RealisedFraction,
  type RealisedFractionOptions,
} from '@/lib/engine/label/realised-fraction';
import { requireStimulusShape, type StimulusShape } from '@/lib/engine/label/stimulus-shape';

/** A session's realised fractions, trial by trial, and the pooled one. */
export interface RealisedFractions {
  /** null where nothing moved on that trial. */
  trials: (RealisedFraction | null)[];
  /** Σσ²_shared / Σ(σ²_shared + σ²_own) over the trials that moved; null when none did. */
  pooled: number | null;
}

/**
 * Realised shared-motion fraction of every trial of a session, and the pooled fraction.
 *
 * Per trial as in realised-fraction; pooled = Σσ²_shared / Σ(σ²_shared + σ²_own).
 * Shapes: `velocity` nTrials × L × A × T row-major, deg/s. Mutates nothing. Throws EngineError as realised-fraction does, with
 * the trial. Cost: nTrials times that of one. Source: see realised-fraction.
 */
export function realisedFractions(
  velocity: ArrayLike<number>,
  nTrials: number,
  shape: StimulusShape,
  options: RealisedFractionOptions = {},
): RealisedFractions {
  requireStimulusShape(shape);
  const size = shape.nLocations * shape.nAxes * shape.nFrames;
  if (!Number.isInteger(nTrials) || nTrials < 0 || velocity.length !== nTrials * size) {
    throw new EngineError(
      'shapeMismatch',
      `${nTrials} trials need ${nTrials * size} velocities, not ${velocity.length}`,
    );
  }
  let shared = 0;
  let all = 0;
  const trials = Array.from({ length: nTrials }, (_, i) => {
    const one = ofTrial(velocity, shape, options, i, size);
    if (one !== null) {
      shared += one.sharedVariance;
      all += one.sharedVariance + one.ownVariance;
    }
    return one;
  });
  return { trials, pooled: all > 0 ? shared / all : null };
}

function ofTrial(
  velocity: ArrayLike<number>,
  shape: StimulusShape,
  options: RealisedFractionOptions,
  trial: number,
  size: number,
): RealisedFraction | null {
  try {
    return realisedFraction(velocity, shape, options, trial * size);
  } catch (error) {
    if (error instanceof EngineError && error.place.trial === undefined) {
      throw new EngineError(error.code, `Trial ${trial + 1}: ${error.message}`, { ...error.place, trial });
    }
    throw error;
  }
}
