import { EngineError } from '@/lib/engine/engine-error';
import type { Interval } from '@/lib/engine/measures/interval';
import { mean } from '@/lib/engine/measures/mean';
import { quantiles } from '@/lib/engine/measures/quantiles';
import type { RandomSource } from '@/lib/engine/measures/random-source';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';
import { variance } from '@/lib/engine/measures/variance';
import { fisherZPower } from '@/lib/engine/plan/fisher-z-power';
import { fitInversePower } from '@/lib/engine/plan/fit-inverse-power';
import { inversePowerAt, type InversePower } from '@/lib/engine/plan/inverse-power';

/** Held-out R² of random subsets of a pilot session. */
export interface Pilot {
  /** What is varied; the other is held at the pilot's number. */
  vary: 'trials' | 'units';
  /** m ≥ 3 distinct sizes of the subsets. */
  sizes: readonly number[];
  /** For each size the held-out R² of its random subsets. */
  r2: readonly (readonly number[])[];
  /** Effective trials per recorded trial, in (0, 1]; 1 for independent trials. */
  independentShare?: number;
  /** Trials of the pilot; needed when units vary. */
  nTrials?: number;
}

/** What is wanted. */
export interface PlanOptions {
  power?: number;
  alpha?: number;
  /** Sizes beyond this are not promised: null is returned instead. Default: 10 times the largest subset. */
  maxSize?: number;
  /** Resamples of the subsets for the range of `needed`; default 200. */
  resamples?: number;
}

/** Power by size and the size that reaches the wanted power. */
export interface PilotPlan {
  curve: InversePower;
  points: { size: number; meanR2: number; sdR2: number | null; curveR2: number; power: number }[];
  /** Smallest whole size with the wanted power; null when none up to `maxSize` has it. */
  needed: number | null;
  /** Central 90 % of the needed size over resampled subsets (those that reach it); null when under half of them do. */
  neededRange: Interval | null;
  /** Share of resamples that reach the wanted power at all. */
  reached: number;
  maxSize: number;
}

/**
 * Trials or units needed for a wanted power, from random subsets of a pilot session.
 *
 * R²(s) = a − b·s^(−c) through the subsets' mean R², weighted by their number over their variance; power(s) by Fisher's z, one-sided,
 * with r = √max(0, R²(s)) and n = s·independentShare (trials vary) or nTrials·independentShare (units vary); needed = smallest s with
 * power(s) ≥ power. The range refits the curve to subsets drawn again with replacement; it leaves out that all subsets come
 * from one pilot, so it is too narrow for subsets near the pilot's own size.
 * Shapes: see Pilot. Mutates only the state of `random`. Throws EngineError on shapes that disagree, fewer than 3 sizes, a size
 * without subsets, or options out of range. Cost: (1 + resamples) fits of the curve.
 * Source: subsampling and inverse-power curves, Cortes et al., NIPS 1993 (from memory); power of r, Fisher, Metron 1921.
 */
export function planFromPilot(pilot: Pilot, random: RandomSource, options: PlanOptions = {}): PilotPlan {
  const { power = 0.8, alpha = 0.05, resamples = 200 } = options;
  const share = pilot.independentShare ?? 1;
  requirePilot(pilot, share);
  const largest = Math.max(...pilot.sizes);
  const maxSize = options.maxSize ?? 10 * largest;
  if (!(power > 0 && power < 1) || !(maxSize >= 1) || !Number.isInteger(resamples) || resamples < 0) {
    throw new EngineError(
      'invalidOption',
      'The wanted power, the largest size or the resamples are out of range',
    );
  }
  const powerAt = (curve: InversePower, size: number): number => {
    const n = share * (pilot.vary === 'trials' ? size : (pilot.nTrials ?? 0));
    return fisherZPower(Math.sqrt(Math.min(1, Math.max(0, inversePowerAt(curve, size)))), n, alpha, 1);
  };
  const neededFor = (curve: InversePower): number | null =>
    firstSize(maxSize, (s) => powerAt(curve, s) >= power);
  const curve = fitSubsets(pilot.sizes, pilot.r2);
  const found: number[] = [];
  for (let b = 0; b < resamples; b += 1) {
    const again = pilot.r2.map((values) => values.map(() => values[random.integer(values.length)]));
    const size = neededFor(fitSubsets(pilot.sizes, again));
    if (size !== null) found.push(size);
  }
  const ends = 2 * found.length > resamples ? quantiles(found, [0.05, 0.95]) : null;
  return {
    curve,
    points: pilot.sizes.map((size, i) => {
      const s2 = variance(pilot.r2[i]);
      return {
        size,
        meanR2: mean(pilot.r2[i]) ?? 0,
        sdR2: s2 === null ? null : Math.sqrt(s2),
        curveR2: inversePowerAt(curve, size),
        power: powerAt(curve, size),
      };
    }),
    needed: neededFor(curve),
    neededRange: ends && { low: ends[0], high: ends[1], level: 0.9, method: 'subsets resampled' },
    reached: resamples === 0 ? 0 : found.length / resamples,
    maxSize,
  };
}

function requirePilot(pilot: Pilot, share: number): void {
  requireNumbers('A size', pilot.sizes);
  if (pilot.r2.length !== pilot.sizes.length) {
    throw new EngineError(
      'shapeMismatch',
      `${pilot.r2.length} sets of subsets stand beside ${pilot.sizes.length} sizes`,
    );
  }
  pilot.r2.forEach((values, i) => {
    requireNumbers(`R² at size ${pilot.sizes[i]}`, values);
    if (values.length === 0)
      throw new EngineError('notEstimable', `There is no subset of size ${pilot.sizes[i]}`);
  });
  if (!(share > 0 && share <= 1)) {
    throw new EngineError(
      'invalidOption',
      `The share of independent trials must lie between 0 and 1, not at ${share}`,
    );
  }
  if (pilot.vary === 'units' && !((pilot.nTrials ?? 0) > 3)) {
    throw new EngineError('invalidOption', 'Planning units needs the number of trials, more than 3');
  }
}

function fitSubsets(sizes: readonly number[], r2: readonly (readonly number[])[]): InversePower {
  const spreads = r2.map((values) => variance(values) ?? 0);
  // A size with a single subset (or equal ones) borrows the average spread; no spread at all means equal weights.
  const average = mean(spreads.filter((s2) => s2 > 0)) ?? 1;
  const weights = r2.map(
    (values, i) => values.length / (spreads[i] > 0 ? Math.max(spreads[i], 1e-6 * average) : average),
  );
  const most = Math.max(...weights);
  return fitInversePower(
    sizes,
    r2.map((values) => mean(values) ?? 0),
    weights.map((w) => w / most),
  );
}

/** Smallest whole size up to `maxSize` that is enough: bisection, for power never falls with size along the curve. */
function firstSize(maxSize: number, isEnough: (size: number) => boolean): number | null {
  let high = Math.floor(maxSize);
  if (!isEnough(high)) return null;
  let low = 0;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (isEnough(middle)) high = middle;
    else low = middle;
  }
  return high;
}
