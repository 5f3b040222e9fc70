import { formatDate } from '@/lib/format/format-date';

/** Writes an instant (RFC 3339) to the minute, in UTC and named so: 14 May 2026, 18:20 UTC. */
export function formatInstant(instant: string | null | undefined): string {
  if (!instant) return '–';
  const date = new Date(instant);
  if (Number.isNaN(date.getTime())) return instant;
  const two = (value: number) => String(value).padStart(2, '0');
  return `${formatDate(instant)}, ${two(date.getUTCHours())}:${two(date.getUTCMinutes())} UTC`;
}
