import { env } from '@/lib/env/env';
import { AppError } from '@/lib/errors/app-error';

const safeMethods = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses an unsafe request that rides on a cookie and does not come from our own pages. Requests with an
 * Authorization header, or without any cookie, carry no authority that a foreign page could borrow, and pass.
 */
export function checkOrigin(request: Request): void {
  if (safeMethods.has(request.method) || request.headers.has('authorization')) return;
  if (!request.headers.has('cookie')) return;
  const origin = request.headers.get('origin');
  if (origin === null) {
    if (request.headers.get('sec-fetch-site') === 'same-origin') return;
  } else if (isOwnOrigin(origin, request)) return;
  throw new AppError('forbidden', 'This request does not come from a page of this site, so it was refused.');
}

function isOwnOrigin(origin: string, request: Request): boolean {
  let given: URL;
  try {
    given = new URL(origin);
  } catch {
    return false;
  }
  const publicUrl = env().PUBLIC_URL;
  if (publicUrl && given.origin === new URL(publicUrl).origin) return true;
  return given.host === (request.headers.get('host') ?? new URL(request.url).host);
}
