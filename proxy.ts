import { NextResponse, type NextRequest } from 'next/server';
import { env } from '@/lib/env/env';
import { isDatabaseAway } from '@/lib/services/health/is-database-away';

const awayPath = '/away';

/**
 * Page headers only: a nonce for the content security policy, a request id, and the path for the sign-in page to
 * lead back to. Whether somebody may see a page is decided where the page reads its data, never here. While the
 * database is away every page is the one that says so, with status 503: a page that fails later could only say 500.
 */
export async function proxy(request: NextRequest): Promise<NextResponse> {
  const nonce = Buffer.from(crypto.getRandomValues(new Uint8Array(16))).toString('base64');
  const requestId = crypto.randomUUID();
  const isDevelopment = process.env.NODE_ENV === 'development';
  const isSecure = process.env.PUBLIC_URL?.startsWith('https:') ?? false;
  const policy = [
    "default-src 'self'",
    // 'strict-dynamic' lets the framework's nonced scripts load their chunks; eval serves the development server only.
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${isDevelopment ? " 'unsafe-eval'" : ''}`,
    `style-src 'self' ${isDevelopment ? "'unsafe-inline'" : `'nonce-${nonce}'`}`,
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "font-src 'self'",
    "connect-src 'self'",
    "worker-src 'self' blob:",
    "object-src 'none'",
    "base-uri 'none'",
    "form-action 'self'",
    "frame-ancestors 'none'",
    ...(isSecure ? ['upgrade-insecure-requests'] : []),
  ].join('; ');

  const headers = new Headers(request.headers);
  headers.set('content-security-policy', policy);
  headers.set('x-nonce', nonce);
  headers.set('x-request-id', requestId);
  headers.set('x-outfold-path', request.nextUrl.pathname + request.nextUrl.search);
  if (request.nextUrl.pathname !== awayPath && (await isDatabaseAway())) return answerAway();
  const response = NextResponse.next({ request: { headers } });
  response.headers.set('content-security-policy', policy);
  response.headers.set('x-request-id', requestId);
  response.headers.set('x-content-type-options', 'nosniff');
  response.headers.set('x-frame-options', 'DENY');
  response.headers.set('referrer-policy', 'same-origin');
  response.headers.set('permissions-policy', 'camera=(), microphone=(), geolocation=()');
  response.headers.set('cross-origin-opener-policy', 'same-origin');
  if (isSecure) response.headers.set('strict-transport-security', 'max-age=63072000; includeSubDomains');
  return response;
}

/** The page that says so, taken from this server itself: a rewrite cannot carry the status. */
async function answerAway(): Promise<NextResponse> {
  const { HOST, PORT } = env();
  const host = HOST === '0.0.0.0' || HOST === '::' ? '127.0.0.1' : HOST.includes(':') ? `[${HOST}]` : HOST;
  const page = await fetch(`http://${host}:${PORT}${awayPath}`, { cache: 'no-store' });
  const headers = new Headers(page.headers);
  for (const name of ['content-encoding', 'content-length', 'transfer-encoding', 'connection', 'keep-alive'])
    headers.delete(name);
  headers.set('retry-after', '5');
  headers.set('cache-control', 'no-store');
  return new NextResponse(await page.text(), { status: 503, headers });
}

// The API stays out: bodies over 10 MB would be cut silently here, and route() sets its own headers.
export const config = { matcher: ['/((?!api/|_next/static|_next/image|fonts/|favicon.ico|icon.svg).*)'] };
