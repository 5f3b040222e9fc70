/**
 * Lag-1 autocorrelation of a series in trial order: Σ(xₜ − x̄)(xₜ₊₁ − x̄) / Σ(xₜ − x̄)², missing values left out (their
 * neighbours do not become neighbours). null without spread.
 * Source: Box & Jenkins, Time Series Analysis, the usual estimator r₁.
 */
export function lagOne(values: readonly (number | null)[]): number | null {
  const present = values.filter((value) => value !== null);
  if (present.length < 3) return null;
  const mean = present.reduce((sum, value) => sum + value, 0) / present.length;
  let below = 0;
  let above = 0;
  values.forEach((value, index) => {
    if (value === null) return;
    below += (value - mean) ** 2;
    const next = values[index + 1];
    if (next !== null && next !== undefined) above += (value - mean) * (next - mean);
  });
  return below === 0 ? null : above / below;
}
