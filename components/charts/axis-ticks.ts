/** Ticks of an axis, with the number of decimals that tells them apart. */
export interface AxisTicks {
  values: number[];
  decimals: number;
  step: number;
}

/**
 * Round tick values (1, 2 or 5 times a power of ten) that enclose [low, high], about `wanted` of them.
 * `within` keeps only ticks inside the range, for axes that must not run past it.
 */
export function axisTicks(low: number, high: number, wanted = 5, within = false): AxisTicks {
  if (!(high > low)) {
    const pad = Math.abs(low) > 0 ? Math.abs(low) * 0.5 : 0.5;
    return axisTicks(low - pad, low + pad, wanted, within);
  }
  const raw = (high - low) / Math.max(1, wanted);
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = ([1, 2, 5, 10].find((k) => k * power >= raw * 0.8) ?? 10) * power;
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const slack = 1e-9 * step;
  const first = within ? Math.ceil((low - slack) / step) : Math.floor((low + slack) / step);
  const last = within ? Math.floor((high + slack) / step) : Math.ceil((high - slack) / step);
  const values: number[] = [];
  // Multiplying the index keeps 0.3 from becoming 0.30000000000000004 through repeated sums.
  for (let k = first; k <= last; k += 1) values.push(Number((k * step).toFixed(decimals + 2)));
  return { values, decimals, step };
}
