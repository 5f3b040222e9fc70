/** Residuals (held-out minus true) of the trials that have one, their scale and the bound beyond which a dot marks them. */
export interface Residuals {
  values: (number | null)[];
  /** Half height of the lane in label units, a round number that holds all but rare outliers. */
  limit: number;
  /** 2.3 standard deviations of the residuals. */
  outlier: number;
}

/** Works out the residual lane's numbers. */
export function residualScale(
  label: readonly (number | null)[],
  predicted: readonly (number | null)[],
): Residuals {
  const values = label.map((value, trial) => {
    const guess = predicted[trial];
    return value === null || guess === null || guess === undefined ? null : guess - value;
  });
  const present = values.filter((value) => value !== null);
  const sd = Math.sqrt(present.reduce((sum, value) => sum + value * value, 0) / Math.max(1, present.length));
  const largest = present.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const raw = Math.min(largest, 3.5 * sd) || 1;
  const power = 10 ** Math.floor(Math.log10(raw));
  const limit = Math.ceil((raw / power) * 10) * (power / 10);
  return { values, limit, outlier: 2.3 * sd };
}
