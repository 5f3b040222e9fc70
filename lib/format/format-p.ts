import { formatNumber } from '@/lib/format/format-number';

/** Writes a p value with three decimals, and with as many as its first digit needs below 0.001: never "0.000". */
export function formatP(p: number | null | undefined): string {
  if (p === null || p === undefined || !Number.isFinite(p)) return '–';
  if (p > 0 && p < 0.0005) return formatNumber(p, Math.min(Math.ceil(-Math.log10(p)), 12));
  return formatNumber(p, 3);
}
