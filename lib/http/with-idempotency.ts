import { createHash } from 'node:crypto';
import { db } from '@/db/connection';
import {
  claimIdempotencyKey,
  findIdempotencyKey,
  releaseIdempotencyKey,
  storeIdempotentAnswer,
} from '@/db/repositories/idempotency-keys';
import { AppError } from '@/lib/errors/app-error';
import { log } from '@/lib/log/log';
import { problemResponse } from './problem-response';
import { toAppError } from './to-app-error';

interface StoredAnswer {
  headers: Record<string, string>;
  body: string;
}

/**
 * Carries a POST out once per Idempotency-Key of a user. A repeat of the same request gets the same answer, with
 * `Idempotency-Replayed: true`; another request under the same key is a conflict. What failed on our side frees its
 * key. A request whose outcome was lost (the process died in it) keeps its key taken: it is never carried out twice.
 *
 * @param secretAnswer the answer holds a secret that is shown once: it is not kept, and a repeat is a conflict
 */
export async function withIdempotency(
  request: Request,
  input: { userId: string; requestId: string; body: Uint8Array; secretAnswer: boolean },
  carryOut: () => Promise<Response>,
): Promise<Response> {
  const key = request.headers.get('idempotency-key');
  if (key === null) return carryOut();
  if (!/^[\x21-\x7e]{1,200}$/.test(key))
    throw new AppError('malformed-request', 'Idempotency-Key must be 1 to 200 visible ASCII characters.');
  const url = new URL(request.url);
  const claim = {
    user_id: input.userId,
    idempotency_key: key,
    route: `${request.method} ${url.pathname}${url.search}`.slice(0, 300),
    request_hash: createHash('sha256').update(input.body).digest('hex'),
  };
  if (!(await claimIdempotencyKey(db(), claim))) return replay(claim, input);

  let response: Response;
  try {
    response = await carryOut();
  } catch (error) {
    const problem = toAppError(error);
    if (problem.status >= 500 || problem.code === 'rate-limited' || problem.code === 'unauthenticated') {
      await release(input.userId, key);
      throw error;
    }
    response = problemResponse(problem, input.requestId);
  }
  const stored: StoredAnswer = {
    headers: keptHeaders(response.headers),
    body: input.secretAnswer && response.ok ? '' : await response.clone().text(),
  };
  try {
    await storeIdempotentAnswer(db(), input.userId, key, response.status, JSON.stringify(stored));
  } catch (error) {
    // The change stands and the caller gets its answer; only a repeat will be told that the outcome is unknown.
    log.error({ err: error, requestId: input.requestId }, 'an idempotent answer could not be kept');
  }
  return response;
}

async function replay(
  claim: { user_id: string; idempotency_key: string; route: string; request_hash: string },
  input: { secretAnswer: boolean },
): Promise<Response> {
  const row = await findIdempotencyKey(db(), claim.user_id, claim.idempotency_key);
  if (row === null)
    throw new AppError(
      'conflict',
      'The first request under this Idempotency-Key has just failed. Try again.',
    );
  if (row.route !== claim.route || row.request_hash !== claim.request_hash)
    throw new AppError('conflict', 'This Idempotency-Key has been used for another request. Use a new one.');
  if (row.status === null || row.response === null)
    throw new AppError(
      'conflict',
      'The first request under this Idempotency-Key has no answer yet. Wait a little; if this lasts, look at the list whether it was carried out, and use a new key.',
    );
  const stored = JSON.parse(row.response) as StoredAnswer;
  if (input.secretAnswer && row.status < 300)
    throw new AppError(
      'conflict',
      'This request has been carried out already, and its answer held a secret that is shown only once.',
    );
  return new Response(row.status === 204 ? null : stored.body, {
    status: row.status,
    headers: { ...stored.headers, 'idempotency-replayed': 'true' },
  });
}

async function release(userId: string, key: string): Promise<void> {
  try {
    await releaseIdempotencyKey(db(), userId, key);
  } catch (error) {
    log.error({ err: error }, 'an idempotency key could not be freed');
  }
}

function keptHeaders(headers: Headers): Record<string, string> {
  const kept: Record<string, string> = {};
  for (const name of ['content-type', 'etag', 'location']) {
    const value = headers.get(name);
    if (value !== null) kept[name] = value;
  }
  return kept;
}
