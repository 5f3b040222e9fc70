import type { IntervalAxisRange } from '@/components/charts/interval-glyph';

/**
 * One R² axis for a table of intervals: holds zero and all estimates, but never reaches below −0.6, so that one
 * disastrous attempt cannot squeeze the others (what lies beyond is drawn as an arrowhead with its number).
 */
export function sharedAxis(
  items: readonly { value: number | null; interval: { low: number; high: number } | null }[],
): IntervalAxisRange {
  const lows = [-0.2];
  const highs = [0.6];
  for (const { value, interval } of items) {
    if (value !== null) {
      lows.push(value);
      highs.push(value);
    }
    if (interval) {
      lows.push(interval.low);
      highs.push(interval.high);
    }
  }
  const low = Math.max(-0.6, Math.min(...lows));
  const high = Math.min(1, Math.max(...highs));
  const step = 0.2;
  const first = Math.floor(low / step + 1e-9);
  const last = Math.ceil(high / step - 1e-9);
  const ticks = Array.from({ length: last - first + 1 }, (_, k) => Number(((first + k) * step).toFixed(1)));
  return { low: ticks[0], high: ticks[ticks.length - 1], ticks };
}
