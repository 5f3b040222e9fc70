import { env } from '@/lib/env/env';
import { AppError } from '@/lib/errors/app-error';

const loopbackNames = new Set(['localhost', '127.0.0.1', '[::1]']);

/**
 * The origin that the browser used, from the Host header: the framework rewrites 127.0.0.1 to localhost in the
 * request's own address, and redirects would then leave the cookie behind. Only PUBLIC_URL's host, the host that we
 * listen on and loopback names are taken; anything else could point redirects elsewhere.
 */
export function ownOrigin(request: Request): string {
  const host = request.headers.get('host') ?? '';
  const { PUBLIC_URL, HOST } = env();
  const publicUrl = new URL(PUBLIC_URL);
  if (host.toLowerCase() === publicUrl.host) return publicUrl.origin;
  if (/^[A-Za-z0-9.:[\]-]+$/.test(host) && URL.canParse(`http://${host}`)) {
    const { hostname, origin } = new URL(`http://${host}`);
    if (loopbackNames.has(hostname) || hostname === HOST) return origin;
  }
  throw new AppError(
    'malformed-request',
    'This host name is not one of the site. Set PUBLIC_URL to the address that people use.',
  );
}
