import { formatNumber } from '@/lib/format/format-number';

/** Writes an interval as [0.40, 0.50]; an en dash where there is none. */
export function formatInterval(
  interval: { low: number; high: number } | null | undefined,
  decimals = 2,
): string {
  if (!interval) return '–';
  return `[${formatNumber(interval.low, decimals)}, ${formatNumber(interval.high, decimals)}]`;
}
