/** Pearson correlation over the pairs that have both values, and how many they are; null without spread. */
export function correlate(
  a: readonly (number | null)[],
  b: readonly (number | null)[],
): { r: number | null; n: number } {
  let n = 0;
  let meanA = 0;
  let meanB = 0;
  let saa = 0;
  let sbb = 0;
  let sab = 0;
  // One pass with running means (Welford's update for a covariance), so that large offsets cost no digits.
  for (let k = 0; k < a.length; k += 1) {
    const x = a[k];
    const y = b[k];
    if (x === null || y === null || x === undefined || y === undefined) continue;
    n += 1;
    const dx = x - meanA;
    const dy = y - meanB;
    meanA += dx / n;
    meanB += dy / n;
    saa += dx * (x - meanA);
    sbb += dy * (y - meanB);
    sab += dx * (y - meanB);
  }
  return { r: n < 3 || saa === 0 || sbb === 0 ? null : sab / Math.sqrt(saa * sbb), n };
}
