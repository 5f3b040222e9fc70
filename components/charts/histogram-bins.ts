/** One bar of a histogram: half-open [from, to). */
export interface HistogramBin {
  from: number;
  to: number;
  count: number;
}

/** Counts values in bins of a round width (1, 2 or 5 times a power of ten), about `wanted` over their range. */
export function histogramBins(values: readonly number[], wanted = 24): HistogramBin[] {
  if (values.length === 0) return [];
  const low = Math.min(...values);
  const high = Math.max(...values);
  // Narrower bins than this would be split by rounding alone.
  const least = 1e-6 * Math.max(1, Math.abs(low), Math.abs(high));
  const raw = Math.max((high - low) / wanted, least);
  const power = 10 ** Math.floor(Math.log10(raw));
  const width = ([1, 2, 5, 10].find((k) => k * power >= raw * 0.999) ?? 10) * power;
  // A value that is a bin edge up to rounding belongs to the bin that begins there.
  const indexOf = (value: number): number => Math.floor(value / width + 1e-9);
  const first = indexOf(low);
  const bins = Array.from({ length: indexOf(high) - first + 1 }, (_, k) => ({
    from: (first + k) * width,
    to: (first + k + 1) * width,
    count: 0,
  }));
  for (const value of values) bins[indexOf(value) - first].count += 1;
  return bins;
}
