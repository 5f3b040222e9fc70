import type { z } from 'zod';
import { ApiError } from '@/lib/client/api-error';
import { randomKey } from '@/lib/client/random-key';
import { readApiError } from '@/lib/client/read-api-error';

export interface RequestOptions<Output> {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** Sent as JSON. */
  body?: unknown;
  /** Sent as it is (octets of a part). */
  octets?: Blob | ArrayBuffer;
  /** Parses the answer; without it the answer's body is dropped. */
  schema?: z.ZodType<Output>;
  /** Same key on a repeat: the act happens once. Made for every POST unless one is given. */
  idempotencyKey?: string;
  ifMatch?: string;
  signal?: AbortSignal;
}

/**
 * Calls /api/v1 with the session cookie. `path` starts after /api/v1 ("/studies").
 * Throws ApiError for every refusal and, with code "offline", where no answer came.
 */
export async function requestJson<Output = undefined>(
  path: string,
  options: RequestOptions<Output> = {},
): Promise<Output> {
  const method = options.method ?? (options.body === undefined ? 'GET' : 'POST');
  const headers: Record<string, string> = { accept: 'application/json, application/problem+json' };
  if (options.body !== undefined) headers['content-type'] = 'application/json';
  if (options.octets !== undefined) headers['content-type'] = 'application/octet-stream';
  if (method === 'POST') headers['idempotency-key'] = options.idempotencyKey ?? randomKey();
  if (options.ifMatch !== undefined) headers['if-match'] = options.ifMatch;
  let response: Response;
  try {
    response = await fetch(`/api/v1${path}`, {
      method,
      headers,
      body: options.octets ?? (options.body === undefined ? undefined : JSON.stringify(options.body)),
      credentials: 'same-origin',
      cache: 'no-store',
      signal: options.signal,
    });
  } catch (cause) {
    if (cause instanceof DOMException && cause.name === 'AbortError') throw cause;
    throw new ApiError({
      status: 0,
      code: 'offline',
      title: 'No answer from the service',
      detail: 'The service did not answer. Check the connection and try again.',
    });
  }
  if (!response.ok) throw await readApiError(response);
  if (!options.schema) return undefined as Output;
  const parsed = options.schema.safeParse(await response.json());
  if (!parsed.success) {
    throw new ApiError({
      status: response.status,
      code: 'internal',
      title: 'The answer was not understood',
      detail: 'This page and the service are of different versions. Reload the page.',
    });
  }
  return parsed.data;
}
