import { formatNumber } from '@/lib/format/format-number';

/** Writes a value of unknown scale with at most `significant` digits and no trailing zeros, for data cells and bin edges. */
export function formatValue(value: number | null | undefined, significant = 4): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return '–';
  if (value === 0) return '0';
  const size = Math.floor(Math.log10(Math.abs(value)));
  const decimals = Math.min(Math.max(significant - 1 - size, 0), 10);
  const text = formatNumber(value, decimals);
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text;
}
