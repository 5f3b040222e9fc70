/**
 * The caller's address, for throttling only. Next fills X-Forwarded-For from the socket where no proxy has set it;
 * behind a proxy the last entry is the one that our own proxy wrote.
 */
export function clientAddressOf(request: Request): string {
  const forwarded = request.headers.get('x-forwarded-for');
  const last = forwarded?.split(',').at(-1)?.trim();
  return last ? last.slice(0, 60) : 'unknown';
}
