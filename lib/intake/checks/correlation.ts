/**
 * Pearson's r over the rows where both values are finite; NaN where either side is constant there.
 * @returns r and the number of rows
 */
export function correlation(x: ArrayLike<number>, y: ArrayLike<number>): { r: number; n: number } {
  let n = 0;
  let meanX = 0;
  let meanY = 0;
  let sxx = 0;
  let syy = 0;
  let sxy = 0;
  // One pass by running means (Welford's update), which stays accurate for large offsets such as trial times.
  for (let row = 0; row < x.length; row++) {
    if (!Number.isFinite(x[row]) || !Number.isFinite(y[row])) continue;
    n += 1;
    const dx = x[row] - meanX;
    const dy = y[row] - meanY;
    meanX += dx / n;
    meanY += dy / n;
    sxx += dx * (x[row] - meanX);
    syy += dy * (y[row] - meanY);
    sxy += dx * (y[row] - meanY);
  }
  return { r: sxx > 0 && syy > 0 ? sxy / Math.sqrt(sxx * syy) : NaN, n };
}
