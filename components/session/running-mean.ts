/** Centred running mean over `width` places; shorter at the ends, missing values left out, null where none is near. */
export function runningMean(values: readonly (number | null)[], width: number): (number | null)[] {
  const half = Math.floor(width / 2);
  const sums = new Float64Array(values.length + 1);
  const counts = new Int32Array(values.length + 1);
  values.forEach((value, index) => {
    sums[index + 1] = sums[index] + (value ?? 0);
    counts[index + 1] = counts[index] + (value === null ? 0 : 1);
  });
  return values.map((_, index) => {
    const from = Math.max(0, index - half);
    const to = Math.min(values.length, index + half + 1);
    const n = counts[to] - counts[from];
    return n === 0 ? null : (sums[to] - sums[from]) / n;
  });
}
