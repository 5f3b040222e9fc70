import { addOnePValue } from '@/lib/engine/measures/add-one-p-value';
import { countExceedances } from '@/lib/engine/measures/count-exceedances';
import { quantiles } from '@/lib/engine/measures/quantiles';
import { smallestP } from '@/lib/engine/measures/smallest-p';
import type { NullNumbers } from '@/lib/engine/readout/types';

/** The shuffled control of an observed R²: exceedances, add-one p, smallest attainable p, quantiles (type 7). */
export function nullNumbers(
  kind: string,
  observed: number | null,
  values: Float64Array,
  logArrangements: number | null,
): NullNumbers | null {
  const draws = values.length;
  if (draws === 0) return null;
  const exceedances = observed === null ? 0 : countExceedances(observed, values);
  const found = quantiles(values, [0.025, 0.05, 0.5, 0.95, 0.975, 1]);
  const [q025, q05, q50, q95, q975, max] = found ?? [null, null, null, null, null, null];
  return {
    kind,
    draws,
    exceedances,
    p: observed === null ? null : addOnePValue(exceedances, draws),
    smallestP: smallestP(draws, logArrangements),
    quantiles: { q025, q05, q50, q95, q975, max },
    values: Array.from(values),
  };
}
