import { Auth } from '@auth/core';
import type { AppError } from '@/lib/errors/app-error';
import { checkOrigin } from '@/lib/http/check-origin';
import { clientAddressOf } from '@/lib/http/client-address';
import { limitRate } from '@/lib/http/limit-rate';
import { problemResponse } from '@/lib/http/problem-response';
import { readBody } from '@/lib/http/read-body';
import { requestIdOf } from '@/lib/http/request-id';
import { toAppError } from '@/lib/http/to-app-error';
import { log } from '@/lib/log/log';
import { authOptions } from './auth-options';
import { ownOrigin } from './own-origin';

const budget = { name: 'auth', points: 300, seconds: 60 };
const maxBytes = 16 * 1024;

/** Everything under /api/auth: Auth.js on a request that is rebuilt with the origin that the browser used. */
export async function handleAuthRequest(request: Request): Promise<Response> {
  const requestId = requestIdOf(request);
  try {
    checkOrigin(request);
    const address = clientAddressOf(request);
    await limitRate(budget, address);
    const url = new URL(request.url);
    const body = request.method === 'GET' ? undefined : new Uint8Array(await readBody(request, maxBytes));
    const rebuilt = new Request(`${ownOrigin(request)}${url.pathname}${url.search}`, {
      method: request.method,
      headers: request.headers,
      body,
    });
    let failure: AppError | null = null;
    const answer = await Auth(
      rebuilt,
      authOptions({
        address,
        agent: request.headers.get('user-agent') ?? '',
        requestId,
        onFailure: (error) => {
          failure = error;
        },
      }),
    );
    return failure === null || !wantsJson(request)
      ? noStore(answer, requestId)
      : withStatus(answer, failure, requestId);
  } catch (error) {
    const problem = toAppError(error);
    if (problem.status >= 500)
      log.error({ err: problem.cause ?? problem, requestId }, 'account service failed');
    return problemResponse(problem, requestId);
  }
}

function wantsJson(request: Request): boolean {
  return request.headers.has('x-auth-return-redirect');
}

/** Auth.js answers 200 with an address to go to; a script is better served by the failure's own status as well. */
async function withStatus(answer: Response, failure: AppError, requestId: string): Promise<Response> {
  const problem = problemResponse(failure, requestId);
  const body = { ...((await answer.json()) as object), ...((await problem.json()) as object) };
  return new Response(JSON.stringify(body), { status: problem.status, headers: problem.headers });
}

function noStore(answer: Response, requestId: string): Response {
  const headers = new Headers(answer.headers);
  headers.set('cache-control', 'no-store');
  headers.set('x-request-id', requestId);
  headers.set('x-content-type-options', 'nosniff');
  return new Response(answer.body, { status: answer.status, headers });
}
