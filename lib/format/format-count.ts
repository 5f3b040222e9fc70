import { formatNumber } from '@/lib/format/format-number';

/** Writes a whole number with thousands parted by a no-break space: 1 000. */
export function formatCount(value: number | null | undefined): string {
  return formatNumber(value, 0);
}
