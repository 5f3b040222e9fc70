import { formatNumber } from '@/lib/format/format-number';

const gap = '\u00a0';

/** Writes a length of time for people: 340 ms, 2.9 s, 41 s, 3 min 5 s, 1 h 12 min, 2 d 3 h. */
export function formatDuration(seconds: number | null | undefined): string {
  if (seconds === null || seconds === undefined || !Number.isFinite(seconds) || seconds < 0) return '–';
  if (seconds < 0.9995) return `${formatNumber(seconds * 1000, 0)}${gap}ms`;
  if (seconds < 9.95) return `${formatNumber(seconds, 1)}${gap}s`;
  const whole = Math.round(seconds);
  if (whole < 60) return `${whole}${gap}s`;
  const two = (large: number, largeUnit: string, small: number, smallUnit: string) =>
    `${large}${gap}${largeUnit}${small > 0 ? ` ${small}${gap}${smallUnit}` : ''}`;
  if (whole < 3600) return two(Math.floor(whole / 60), 'min', whole % 60, 's');
  const minutes = Math.round(seconds / 60);
  if (minutes < 24 * 60) return two(Math.floor(minutes / 60), 'h', minutes % 60, 'min');
  const hours = Math.round(seconds / 3600);
  return two(Math.floor(hours / 24), 'd', hours % 24, 'h');
}
