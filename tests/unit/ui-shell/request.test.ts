import { afterEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { ApiError } from '@/lib/client/api-error';
import { readApiError } from '@/lib/client/read-api-error';
import { requestJson } from '@/lib/client/request-json';
import { safePath } from '@/lib/client/safe-path';

function answer(status: number, body: unknown, headers: Record<string, string> = {}): Response {
  return new Response(typeof body === 'string' ? body : JSON.stringify(body), { status, headers });
}

afterEach(() => vi.unstubAllGlobals());

describe('refusals as errors', () => {
  it('reads a problem+json with its faults (RFC 9457)', async () => {
    const error = await readApiError(
      answer(422, {
        type: '/problems/invalid-input',
        code: 'invalid-input',
        title: 'Some values are not valid',
        detail: 'The name is missing.',
        errors: [{ pointer: '/name', code: 'too_small', detail: 'must not be empty' }],
      }),
    );
    expect(error).toMatchObject({
      status: 422,
      code: 'invalid-input',
      message: 'The name is missing.',
      isPassing: false,
    });
    expect(error.faultAt('/name')).toBe('must not be empty');
    expect(error.faultAt('/nam')).toBeUndefined();
  });
  it('makes a sentence of a gateway’s page', async () => {
    const error = await readApiError(answer(502, '<html>Bad gateway</html>'));
    expect(error).toMatchObject({ code: 'unavailable', isPassing: true });
    expect(error.message).toMatch(/away/);
  });
  it('tells passing refusals from lasting ones', async () => {
    const codes = { 429: true, 503: true, 404: false, 403: false, 422: false } as const;
    for (const [status, isPassing] of Object.entries(codes))
      expect((await readApiError(answer(Number(status), {}))).isPassing).toBe(isPassing);
  });
});

describe('requests', () => {
  it('gives every POST an idempotency key of its own, and keeps one that is given', async () => {
    const keys: (string | null)[] = [];
    vi.stubGlobal('fetch', async (_url: string, init: RequestInit) => {
      keys.push(new Headers(init.headers).get('idempotency-key'));
      return answer(200, { id: 'x' });
    });
    const schema = z.object({ id: z.string() });
    await requestJson('/studies', { body: {}, schema });
    await requestJson('/studies', { body: {}, schema });
    await requestJson('/studies', { body: {}, schema, idempotencyKey: 'mine' });
    await requestJson('/studies', { schema });
    expect(keys[0]).toMatch(/^[0-9a-f]{32}$/);
    expect(keys[1]).not.toBe(keys[0]);
    expect(keys.slice(2)).toEqual(['mine', null]);
  });
  it('says that no answer came', async () => {
    vi.stubGlobal('fetch', async () => {
      throw new TypeError('failed to fetch');
    });
    await expect(requestJson('/studies')).rejects.toMatchObject({
      code: 'offline',
      status: 0,
      isPassing: true,
    });
  });
  it('does not pass on an answer of another shape', async () => {
    vi.stubGlobal('fetch', async () => answer(200, { id: 7 }));
    const wrong = requestJson('/studies', { schema: z.object({ id: z.string() }) });
    await expect(wrong).rejects.toBeInstanceOf(ApiError);
    await expect(wrong).rejects.toThrow(/Reload/);
  });
});

describe('where a sign-in leads', () => {
  it('stays on this site', () => {
    expect(safePath('/studies/1?x=2')).toBe('/studies/1?x=2');
    for (const bad of ['//evil.test', 'https://evil.test', '/\\evil.test', '/sign-in', '/api/v1/x', '', null])
      expect(safePath(bad)).toBe('/');
  });
});
