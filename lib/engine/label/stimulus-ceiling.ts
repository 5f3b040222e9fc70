import { pearson } from '@/lib/engine/measures/pearson';

/**
 * Stimulus ceiling: squared correlation of nominal and realised fraction over a session, the most that a linear function of
 * the realised fraction could reach of the nominal one in this sample.
 *
 * r². Shapes: `nominal`, `realised` n. Range [0, 1]. Mutates nothing. Returns null when n < 2 or either is constant.
 * Throws EngineError on unequal lengths or values that are not finite. Cost: four passes.
 * Source: definition (in-sample R² of a straight line).
 */
export function stimulusCeiling(nominal: ArrayLike<number>, realised: ArrayLike<number>): number | null {
  const r = pearson(nominal, realised);
  return r === null ? null : r * r;
}
