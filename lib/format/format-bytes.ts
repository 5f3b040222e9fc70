import { formatNumber } from '@/lib/format/format-number';

const units = ['B', 'kB', 'MB', 'GB', 'TB'];

/** Writes a size in decimal units: 42 kB, 2.1 GB. Below 10 one decimal is kept. */
export function formatBytes(sizeBytes: number): string {
  let value = sizeBytes;
  let step = 0;
  while (value >= 999.5 && step < units.length - 1) {
    value /= 1000;
    step += 1;
  }
  const decimals = step > 0 && value < 9.95 ? 1 : 0;
  return `${formatNumber(value, decimals)}\u00a0${units[step]}`;
}
