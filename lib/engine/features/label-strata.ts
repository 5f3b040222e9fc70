/** Distinct values of a label, ascending, and each trial's level. */
export interface LabelLevels {
  values: Float64Array;
  codes: Int32Array;
}

/** Most levels that a label may have and still count as one with levels rather than continuous. */
const MAX_LEVELS = 20;

/**
 * The label's levels when it has few of them (at most 20 distinct values, and on average at least three trials each),
 * otherwise null: then it is treated as continuous. Cost O(n log n). Source: common practice, no source.
 */
export function labelLevels(y: Float64Array): LabelLevels | null {
  const values = Float64Array.from(new Set(y)).sort();
  if (values.length > MAX_LEVELS || values.length * 3 > y.length) return null;
  const at = new Map(Array.from(values, (value, code) => [value, code]));
  return { values, codes: Int32Array.from(y, (value) => at.get(value) ?? 0) };
}

/**
 * A stratum for each trial: its level where the label has levels, otherwise the quantile of its label's rank
 * (`nQuantiles` groups of nearly equal size; ties go by trial order). Cost O(n log n).
 */
export function labelStrata(y: Float64Array, nQuantiles: number): Int32Array {
  const levels = labelLevels(y);
  if (levels !== null) return levels.codes;
  const order = Int32Array.from(y, (_, i) => i).sort((a, b) => y[a] - y[b] || a - b);
  const strata = new Int32Array(y.length);
  order.forEach((i, rank) => {
    strata[i] = Math.floor((rank * nQuantiles) / y.length);
  });
  return strata;
}
