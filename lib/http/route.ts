import { z } from 'zod';
import { authenticate } from '@/lib/auth/authenticate';
import { AppError } from '@/lib/errors/app-error';
import { log } from '@/lib/log/log';
import type { Ctx } from '@/lib/services/context';
import { checkOrigin } from './check-origin';
import { clientAddressOf } from './client-address';
import { faultsOf } from './faults-of';
import { limitRate, type RateBudget } from './limit-rate';
import { parseJson } from './parse-json';
import { problemResponse } from './problem-response';
import { checkContentLength, readBody } from './read-body';
import { recordRefusal } from './record-refusal';
import { requestIdOf } from './request-id';
import type { Access, BodyKind, HandleInput, ReturnsKind, RouteDefinition } from './route-definition';
import { toAppError } from './to-app-error';
import { requireIfMatch, versionTag } from './version-tag';
import { withIdempotency } from './with-idempotency';

export type RouteContext = { params: Promise<Record<string, string | string[] | undefined>> };
/** What Next calls, with its definition for the API document and the tests. */
export interface RouteHandler {
  (request: Request, context?: RouteContext): Promise<Response>;
  definition: RouteDefinition;
}

const memberBudget: RateBudget = { name: 'member', points: 1200, seconds: 60 };
const addressBudget: RateBudget = { name: 'address', points: 600, seconds: 60 };
const defaultMaxBytes = 1024 * 1024;
const nothing = z.strictObject({});

/**
 * The one boundary between HTTP and a verb. In order: request id, origin, authentication, rate, size, strict parse,
 * idempotency key, the verb, parse of its answer, ETag; every failure becomes problem+json. Whether the member may
 * do it is decided in the verb.
 */
export function route<
  A extends Access,
  P extends z.ZodType = typeof nothing,
  Q extends z.ZodType = typeof nothing,
  B extends BodyKind = 'none',
  R extends ReturnsKind = ReturnsKind,
>(definition: RouteDefinition<A, P, Q, B, R>): RouteHandler {
  const handler = async (request: Request, context?: RouteContext): Promise<Response> => {
    const startedAt = performance.now();
    const requestId = requestIdOf(request);
    const headers: Record<string, string> = {};
    let ctx: Ctx | null = null;
    let response: Response;
    try {
      checkOrigin(request);
      if (definition.access !== 'public')
        ctx = await authenticate(request, requestId, { basic: definition.access === 'labOrBasic' });
      if (definition.access === 'signedIn' && ctx?.signInId === undefined)
        throw new AppError('forbidden', 'This concerns your account: sign in to do it. A token cannot.');
      Object.assign(
        headers,
        ctx === null
          ? await limitRate(addressBudget, clientAddressOf(request))
          : await limitRate(memberBudget, ctx.actor.userId),
      );
      response = await answer(definition, request, context, ctx, requestId);
    } catch (error) {
      const problem = toAppError(error);
      if (problem.status >= 500) log.error({ err: problem.cause ?? problem, requestId }, 'a request failed');
      if (problem.code === 'forbidden' && ctx !== null) await recordRefusal(ctx, request, problem.message);
      response = problemResponse(problem, requestId);
    }
    log.info(
      {
        requestId,
        method: request.method,
        path: new URL(request.url).pathname,
        status: response.status,
        durationMs: Math.round(performance.now() - startedAt),
        userId: ctx?.actor.userId,
      },
      'request',
    );
    return finish(response, requestId, headers);
  };
  return Object.assign(handler, { definition: definition as unknown as RouteDefinition });
}

async function answer<
  A extends Access,
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends BodyKind,
  R extends ReturnsKind,
>(
  definition: RouteDefinition<A, P, Q, B, R>,
  request: Request,
  context: RouteContext | undefined,
  ctx: Ctx | null,
  requestId: string,
): Promise<Response> {
  const maxBytes = definition.maxBytes ?? defaultMaxBytes;
  const bodyKind: BodyKind = definition.body ?? 'none';
  if (bodyKind !== 'none') checkContentLength(request, maxBytes);

  const params = (definition.params ?? nothing).safeParse((await context?.params) ?? {});
  if (!params.success)
    throw new AppError('not-found', 'There is nothing at this address.', { cause: params.error });
  const query = (definition.query ?? nothing).safeParse(queryOf(request));
  if (!query.success) throw invalid(query.error, 'query');
  let bytes = new Uint8Array(0);
  let body: unknown;
  if (bodyKind === 'stream') body = request.body;
  else if (bodyKind !== 'none') {
    bytes = new Uint8Array(await readBody(request, maxBytes));
    const parsed = await bodyKind.safeParseAsync(parseJson(request, bytes));
    if (!parsed.success) throw invalid(parsed.error, 'body');
    body = parsed.data;
  }
  const ifVersion = definition.requiresVersion ? requireIfMatch(request) : 0;

  const carryOut = async (): Promise<Response> => {
    const input = { ctx, params: params.data, query: query.data, body, request, requestId, ifVersion };
    const outcome = await definition.handle(input as HandleInput<A, P, Q, B>);
    return outcome instanceof Response ? outcome : toResponse(definition, request, outcome);
  };
  if (request.method !== 'POST' || ctx === null || bodyKind === 'stream') return carryOut();
  return withIdempotency(
    request,
    { userId: ctx.actor.userId, requestId, body: bytes, secretAnswer: definition.secretAnswer ?? false },
    carryOut,
  );
}

/** The DTO as JSON, checked against what the route promises; a mismatch is our fault and goes to the log. */
function toResponse(
  definition: { returns: ReturnsKind; status?: number; statusOf?: (answer: never) => number },
  request: Request,
  outcome: unknown,
): Response {
  const status = definition.status ?? 200;
  if (status === 204) return new Response(null, { status });
  if (!(definition.returns instanceof z.ZodType)) throw new Error('the route promises a Response of its own');
  const parsed = definition.returns.safeParse(outcome);
  if (!parsed.success) {
    throw new AppError(
      'internal',
      'Something went wrong on our side. It has been logged under this request id.',
      {
        cause: parsed.error,
      },
    );
  }
  const headers = new Headers({ 'content-type': 'application/json' });
  const { data } = parsed;
  const finalStatus = definition.statusOf?.(data as never) ?? status;
  if (typeof data === 'object' && data !== null && 'version' in data && typeof data.version === 'number') {
    const tag = versionTag(data.version);
    headers.set('etag', tag);
    if (request.method === 'GET' && request.headers.get('if-none-match') === tag && !('state' in data))
      return new Response(null, { status: 304, headers });
  }
  return new Response(JSON.stringify(data), { status: finalStatus, headers });
}

function queryOf(request: Request): Record<string, string | string[]> {
  const query: Record<string, string | string[]> = Object.create(null) as Record<string, string | string[]>;
  for (const [name, value] of new URL(request.url).searchParams) {
    const earlier = query[name];
    query[name] = earlier === undefined ? value : [...(Array.isArray(earlier) ? earlier : [earlier]), value];
  }
  return { ...query };
}

function invalid(error: z.ZodError, part: 'body' | 'query'): AppError {
  const faults = faultsOf(error);
  const first = faults[0];
  const more = faults.length > 1 ? ` (and ${faults.length - 1} more)` : '';
  const where =
    first === undefined || first.pointer === '' ? `the ${part}` : `${first.pointer} in the ${part}`;
  return new AppError('invalid-input', `Not valid: ${where}: ${first?.detail ?? ''}${more}`, {
    faults,
    cause: error,
  });
}

function finish(response: Response, requestId: string, headers: Record<string, string>): Response {
  const all = new Headers(response.headers);
  all.set('x-request-id', requestId);
  all.set('x-content-type-options', 'nosniff');
  all.set('referrer-policy', 'no-referrer');
  all.set('content-security-policy', "default-src 'none'; frame-ancestors 'none'");
  if (!all.has('cache-control')) all.set('cache-control', 'no-store');
  for (const [name, value] of Object.entries(headers)) all.set(name, value);
  return new Response(response.body, { status: response.status, headers: all });
}
