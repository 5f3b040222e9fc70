import { EngineError } from '@/lib/engine/engine-error';
import type { Centring } from '@/lib/engine/label/centring';
import { frameAutocorrelation } from '@/lib/engine/label/frame-autocorrelation';
import { iccInterval } from '@/lib/engine/label/icc-interval';
import { motionMeanSquares } from '@/lib/engine/label/motion-mean-squares';
import { requireStimulusShape, type StimulusShape } from '@/lib/engine/label/stimulus-shape';
import type { Interval } from '@/lib/engine/measures/interval';
import { requireLevel } from '@/lib/engine/measures/require-level';

/** One trial's shared-motion fraction as shown. */
export interface RealisedFraction {
  /** Raw value; may be negative (sampling). */
  fraction: number;
  /** The same held within [0, 1]. */
  clipped: number;
  sharedVariance: number;
  ownVariance: number;
  /** Lag-1 autocorrelation of the frames that the interval used. */
  phi: number;
  interval: Interval | null;
}

/** Options of the realised fraction. */
export interface RealisedFractionOptions {
  centring?: Centring;
  level?: number;
  /** Frames' lag-1 autocorrelation, if known for the whole session; left out: estimated from the trial itself. */
  phi?: number;
}

/**
 * Share of a trial's motion variance that its locations have in common, as it came out on that trial.
 *
 * σ²_shared = (MSB − MSW)/L, σ²_own = MSW, fraction = σ²_shared/(σ²_shared + σ²_own); mean squares by `centring` (default
 * `location`). Interval: F-based with both degrees of freedom multiplied by (1 − φ²)/(1 + φ²).
 * Shapes: `velocity` L·A·T numbers in deg/s (see StimulusShape), from `offset` on. Range of the fraction [−1/(L − 1), 1];
 * variances in (deg/s)². Mutates nothing. Returns null when nothing moves (no variance at all).
 * Throws EngineError for one location or frame, an array that is too short, or a value that is not finite.
 * Cost: a few passes and two F quantiles.
 * Source: Shrout & Fleiss, Psychol. Bull. 1979 (ICC(1) under `axis`, ICC(3) under `location`); effective degrees of freedom of
 * a first-order autoregression, Bartlett, J. R. Stat. Soc. 1935 (from memory).
 */
export function realisedFraction(
  velocity: ArrayLike<number>,
  shape: StimulusShape,
  options: RealisedFractionOptions = {},
  offset = 0,
): RealisedFraction | null {
  const { centring = 'location', level = 0.95 } = options;
  requireStimulusShape(shape);
  requireLevel(level);
  if (options.phi !== undefined && !(Math.abs(options.phi) < 1)) {
    throw new EngineError('invalidOption', `An autocorrelation lies between −1 and 1, not at ${options.phi}`);
  }
  const size = shape.nLocations * shape.nAxes * shape.nFrames;
  if (velocity.length < offset + size) {
    throw new EngineError(
      'shapeMismatch',
      `The stimulus has ${velocity.length - offset} velocities where ${size} are needed`,
    );
  }
  for (let c = offset; c < offset + size; c += 1) {
    if (!Number.isFinite(velocity[c]))
      throw new EngineError('notFinite', 'A velocity of the stimulus is not a finite number');
  }
  const { between, within, dfBetween, dfWithin } = motionMeanSquares(velocity, offset, shape, centring);
  const spread = between + (shape.nLocations - 1) * within;
  // Constant velocities leave only the rounding of their own means.
  let largest = 0;
  for (let c = offset; c < offset + size; c += 1) largest = Math.max(largest, Math.abs(velocity[c]));
  if (!(spread > (8 * Number.EPSILON * largest) ** 2) || !Number.isFinite(spread)) return null;
  const fraction = (between - within) / spread;
  const phi = options.phi ?? frameAutocorrelation(velocity, offset, shape, centring);
  const share = (1 - phi * phi) / (1 + phi * phi);
  return {
    fraction,
    clipped: Math.max(0, Math.min(1, fraction)),
    sharedVariance: (between - within) / shape.nLocations,
    ownVariance: within,
    phi,
    interval: iccInterval(
      between,
      within,
      dfBetween * share,
      dfWithin * share,
      shape.nLocations,
      level,
      `F with autocorrelation, ${centring} centring`,
    ),
  };
}
