import { type AppError, errorCodes } from '@/lib/errors/app-error';

/** An error as problem+json (RFC 9457). Nothing of the cause goes outside. */
export function problemResponse(error: AppError, requestId: string, headers: HeadersInit = {}): Response {
  const answer = new Headers(headers);
  answer.set('content-type', 'application/problem+json');
  answer.set('cache-control', 'no-store');
  answer.set('x-request-id', requestId);
  if (error.code === 'unauthenticated' && !answer.has('www-authenticate'))
    answer.set('www-authenticate', 'Bearer realm="outfold"');
  const retryAfterSeconds =
    error.retryAfterSeconds ?? (error.code === 'unavailable' ? 5 : error.code === 'rate-limited' ? 60 : null);
  if (retryAfterSeconds !== null)
    answer.set('retry-after', String(Math.max(1, Math.ceil(retryAfterSeconds))));
  const body = {
    type: `/problems/${error.code}`,
    title: errorCodes[error.code].title,
    status: error.status,
    detail: error.message,
    code: error.code,
    requestId,
    errors: error.faults,
  };
  return new Response(JSON.stringify(body), { status: error.status, headers: answer });
}
