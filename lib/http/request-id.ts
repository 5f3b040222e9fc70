import { v7 } from 'uuid';

/** The caller's X-Request-Id where it is a plain word of 8 to 60 characters, else a new one. */
export function requestIdOf(request: Request): string {
  const given = request.headers.get('x-request-id');
  return given !== null && /^[A-Za-z0-9_-]{8,60}$/.test(given) ? given : v7();
}
