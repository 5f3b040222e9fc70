import { formatNumber } from '@/lib/format/format-number';

/** Writes a p value with three decimals, and with as many as its first digit needs where three would show "0.000". */
export function formatP(p: number | null | undefined): string {
  if (p === null || p === undefined || !Number.isFinite(p)) return '–';
  let decimals = 3;
  while (p > 0 && decimals < 12 && Number(p.toFixed(decimals)) === 0) decimals += 1;
  return formatNumber(p, decimals);
}
