import { formatNumber } from '@/lib/format/format-number';

/** A number for axes and value lines; with `plus`, positive numbers carry their sign (differences, residuals). */
export function chartNumber(value: number, decimals = 2, plus = false): string {
  const text = formatNumber(value, decimals);
  return plus && value > 0 && Number(value.toFixed(decimals)) !== 0 ? `+${text}` : text;
}
