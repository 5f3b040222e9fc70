const months = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

/** Writes the day of an instant (RFC 3339) or a date (2026-05-14) in UTC: 14 May 2026. An unreadable one is returned as it is. */
export function formatDate(instant: string | null | undefined): string {
  if (!instant) return '–';
  const date = new Date(instant);
  if (Number.isNaN(date.getTime())) return instant;
  return `${date.getUTCDate()} ${months[date.getUTCMonth()]} ${date.getUTCFullYear()}`;
}
