const dayMs = 24 * 60 * 60 * 1000;

/** The instant so many days from now, as the API takes it. */
export function daysFromNow(days: number): string {
  return new Date(Date.now() + days * dayMs).toISOString();
}
