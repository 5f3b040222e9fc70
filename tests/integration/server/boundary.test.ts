import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { z } from 'zod';
import { POST as postAnimal, GET as getAnimals } from '@/app/api/v1/animals/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import { GET as getStudy, PATCH as patchStudy } from '@/app/api/v1/studies/[id]/route';
import { GET as getStudies, POST as postStudy } from '@/app/api/v1/studies/route';
import { GET as getTokens, POST as postToken } from '@/app/api/v1/tokens/route';
import { DELETE as deleteToken } from '@/app/api/v1/tokens/[id]/route';
import { db } from '@/db/connection';
import { route } from '@/lib/http/route';
import { insertLab, insertStudy, type LabRows } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';
import { call, cookieFor, givePassword, origin, password, tokenFor } from './support';

let drop: () => Promise<void>;
let lead: LabRows;
let cookie: string;
let token: string;
beforeAll(async () => {
  drop = await freshDatabase();
  lead = await insertLab();
  await givePassword(lead);
  cookie = await cookieFor(lead);
  token = await tokenFor(lead, ['read', 'intake', 'readouts', 'manage']);
});
afterAll(() => drop());

const newStudy = { name: 'Shared motion', question: 'Is it carried?' };
const json = async (response: Response) => (await response.json()) as Record<string, unknown>;

describe('authentication', () => {
  it('takes a session cookie or a bearer token, and says who it is', async () => {
    for (const credentials of [{ cookie }, { token }]) {
      const response = await call(getMe, credentials);
      expect(response.status).toBe(200);
      expect(await json(response)).toMatchObject({ userId: lead.userId, labId: lead.labId, role: 'lead' });
      expect(response.headers.get('cache-control')).toBe('no-store');
      expect(response.headers.get('x-request-id')).toMatch(/^[0-9a-f-]{36}$/);
      expect(response.headers.get('ratelimit-limit')).toBe('1200');
    }
  });

  it.each([
    ['nothing', {}],
    ['a token nobody made', { token: 'outfold_nonsense' }],
    ['a cookie that was changed', { cookie: 'outfold.session=eyJhbGciOiJkaXIifQ.x.y.z' }],
    ['Basic on a route that does not take it', { headers: { authorization: 'Basic eDp5' } }],
    ['another scheme', { headers: { authorization: 'Digest x' } }],
  ])('answers %s with 401 problem+json', async (_what, credentials) => {
    const response = await call(getMe, credentials);
    expect(response.status).toBe(401);
    expect(response.headers.get('content-type')).toBe('application/problem+json');
    expect(response.headers.get('www-authenticate')).toContain('Bearer');
    expect(await json(response)).toMatchObject({ code: 'unauthenticated', status: 401, errors: [] });
  });

  it('refuses a session from before a password change, one that has ended, one past its time', async () => {
    expect((await call(getMe, { cookie: await cookieFor(lead, { epoch: 7 }) })).status).toBe(401);
    const old = Math.floor(Date.now() / 1000) - 8 * 24 * 3600;
    expect((await call(getMe, { cookie: await cookieFor(lead, { signedInAt: old }) })).status).toBe(401);
    const ended = await cookieFor(lead);
    await db()('sign_ins')
      .where({ user_id: lead.userId })
      .orderBy('id', 'desc')
      .limit(1)
      .update({ ended_at: new Date() });
    expect((await call(getMe, { cookie: ended })).status).toBe(401);
    const idle = await cookieFor(lead);
    await db()('sign_ins')
      .where({ user_id: lead.userId })
      .whereNull('ended_at')
      .orderBy('id', 'desc')
      .limit(1)
      .update({ last_seen_at: new Date(Date.now() - 13 * 3_600_000) });
    expect((await call(getMe, { cookie: idle })).status).toBe(401);
    expect((await call(getMe, { cookie })).status).toBe(200);
  });

  it('a token dies when it is revoked, when it expires, and with the membership', async () => {
    const other = await insertLab({ role: 'analyst' });
    const made = await json(
      await call(postToken, {
        method: 'POST',
        cookie: await cookieFor(other),
        body: { name: 'rig', scopes: ['read'], expiresAt: new Date(Date.now() + 60_000).toISOString() },
      }),
    );
    const bearer = String(made.token);
    expect((await call(getMe, { token: bearer })).status).toBe(200);
    const stored = await db()('api_tokens').where({ id: made.id }).first();
    expect(JSON.stringify(stored)).not.toContain(bearer);
    const revoked = await call(deleteToken, {
      method: 'DELETE',
      cookie: await cookieFor(other),
      params: { id: String(made.id) },
    });
    expect(revoked.status).toBe(204);
    expect((await call(getMe, { token: bearer })).status).toBe(401);

    const second = await tokenFor(other, ['read']);
    await db()('api_tokens')
      .where({ user_id: other.userId })
      .update({ expires_at: new Date(Date.now() - 1000) });
    expect((await call(getMe, { token: second })).status).toBe(401);

    const third = await tokenFor(other, ['read']);
    expect((await call(getMe, { token: third })).status).toBe(200);
    await db()('memberships').where({ user_id: other.userId }).delete();
    expect((await call(getMe, { token: third })).status).toBe(401);
  });

  it('makes a token by HTTP Basic, with scopes up to the role and a sensible end', async () => {
    const basic = { authorization: `Basic ${Buffer.from(`${lead.email}:${password}`).toString('base64')}` };
    const expiresAt = new Date(Date.now() + 60_000).toISOString();
    const made = await call(postToken, {
      method: 'POST',
      headers: basic,
      body: { name: 'rig', scopes: ['read'], expiresAt },
    });
    expect(made.status).toBe(201);
    const bad = await call(postToken, {
      method: 'POST',
      headers: { authorization: `Basic ${Buffer.from(`${lead.email}:wrong`).toString('base64')}` },
      body: { name: 'rig', scopes: ['read'], expiresAt },
    });
    expect(bad.status).toBe(401);

    const experimenter = await insertLab({ role: 'experimenter' });
    const beyond = await call(postToken, {
      method: 'POST',
      cookie: await cookieFor(experimenter),
      body: { name: 'rig', scopes: ['read', 'readouts', 'manage'], expiresAt: '2001-01-01T00:00:00Z' },
    });
    expect(beyond.status).toBe(422);
    expect((await json(beyond)).errors).toMatchObject([
      { pointer: '/scopes/1', code: 'beyond-role' },
      { pointer: '/scopes/2', code: 'beyond-role' },
      { pointer: '/expiresAt', code: 'out-of-range' },
    ]);
  });

  it('a role that shrinks takes its tokens along', async () => {
    const member = await insertLab({ role: 'lead' });
    const wide = await tokenFor(member, ['intake', 'manage']);
    expect((await call(postStudy, { method: 'POST', token: wide, body: newStudy })).status).toBe(201);
    await db()('memberships').where({ user_id: member.userId }).update({ role: 'observer' });
    expect((await call(postStudy, { method: 'POST', token: wide, body: newStudy })).status).toBe(403);
    expect(
      (await call(getTokens, { token: await tokenFor({ ...member, role: 'observer' }, ['read']) })).status,
    ).toBe(403);
  });
});

describe('origin', () => {
  it.each([
    ['another site', { origin: 'https://elsewhere.test' }, 403],
    ['an opaque origin', { origin: 'null' }, 403],
    ['the same host on another port', { origin: 'http://127.0.0.1:9999' }, 403],
    ['our own pages', { origin }, 201],
    ['no Origin, but marked same-origin', { 'sec-fetch-site': 'same-origin' }, 201],
    ['no Origin, marked cross-site', { 'sec-fetch-site': 'cross-site' }, 403],
  ])('a cookie with %s', async (_what, headers, status) => {
    const all = new Headers({
      host: '127.0.0.1:3000',
      cookie,
      'content-type': 'application/json',
      ...headers,
    });
    const request = new Request(`${origin}/api/v1/studies`, {
      method: 'POST',
      headers: all,
      body: JSON.stringify(newStudy),
    });
    const response = await postStudy(request, { params: Promise.resolve({}) });
    expect(response.status).toBe(status);
  });

  it('does not matter to a bearer token, nor to reading', async () => {
    const headers = { origin: 'https://elsewhere.test' };
    expect((await call(postStudy, { method: 'POST', token, headers, body: newStudy })).status).toBe(201);
    expect((await call(getStudies, { cookie, headers })).status).toBe(200);
  });
});

describe('bodies', () => {
  it('names every fault at once, each with a JSON pointer', async () => {
    const response = await call(postAnimal, {
      method: 'POST',
      token,
      body: { studyId: 'x', code: '', species: 3, sex: 'other', labId: 'mine', 'a/b': 1 },
    });
    expect(response.status).toBe(422);
    const problem = await json(response);
    expect(problem).toMatchObject({ code: 'invalid-input', type: '/problems/invalid-input' });
    const pointers = (problem.errors as { pointer: string }[]).map(({ pointer }) => pointer);
    expect(pointers.sort()).toEqual(['/a~1b', '/code', '/labId', '/sex', '/species', '/studyId']);
  });

  it.each([
    ['broken JSON', '{"name":', 'application/json', 400, 'malformed-request'],
    ['an empty body', '', 'application/json', 400, 'malformed-request'],
    [
      'bytes that are not UTF-8',
      new Uint8Array([0x22, 0xff, 0x22]),
      'application/json',
      400,
      'malformed-request',
    ],
    ['a form', 'name=x', 'application/x-www-form-urlencoded', 415, 'unsupported-format'],
    ['a text that looks like JSON', '{}', 'text/plain', 415, 'unsupported-format'],
    ['a list', '[]', 'application/json', 422, 'invalid-input'],
    ['too much', JSON.stringify({ name: 'x'.repeat(1024 * 1024) }), 'application/json', 413, 'too-large'],
  ])('answers %s as such', async (_what, body, type, status, code) => {
    const response = await call(postStudy, {
      method: 'POST',
      token,
      body,
      headers: { 'content-type': type },
    });
    expect(response.status).toBe(status);
    expect(await json(response)).toMatchObject({ code });
  });

  it('stops reading a body without a length once it is over the cap', async () => {
    let pulled = 0;
    const stream = new ReadableStream<Uint8Array>({
      pull(controller) {
        pulled += 1;
        controller.enqueue(new Uint8Array(64 * 1024));
      },
    });
    const request = new Request(`${origin}/api/v1/studies`, {
      method: 'POST',
      headers: { authorization: `Bearer ${token}`, 'content-type': 'application/json' },
      body: stream,
      duplex: 'half',
    } as RequestInit);
    expect((await postStudy(request, { params: Promise.resolve({}) })).status).toBe(413);
    expect(pulled).toBeLessThan(40);
  });

  it('answers unknown and doubled query parameters and foreign cursors with 422', async () => {
    for (const path of ['/?page=2', '/?limit=1&limit=2', '/?limit=0', '/?cursor=zzz'])
      expect((await call(getStudies, { token, path })).status, path).toBe(422);
  });
});

describe('answers', () => {
  it('keeps an answer that breaks its contract inside, as a 500 without a trace', async () => {
    const broken = route({
      access: 'public',
      action: null,
      returns: z.strictObject({ id: z.uuid() }),
      handle: async () => ({ id: 'secret-value' }),
    });
    const throwing = route({
      access: 'public',
      action: null,
      returns: z.strictObject({}),
      handle: async () => {
        throw new TypeError('secret-value at /srv/app/lib');
      },
    });
    for (const handler of [broken, throwing]) {
      const response = await call(handler, {});
      expect(response.status).toBe(500);
      const text = await response.text();
      expect(text).not.toContain('secret-value');
      expect(JSON.parse(text)).toMatchObject({ code: 'internal' });
    }
  });

  it('pages by keyset: every study once, newest first', async () => {
    const member = await insertLab();
    const bearer = await tokenFor(member, ['read']);
    const made: string[] = [];
    for (let n = 0; n < 5; n++) made.unshift(await insertStudy(member));
    const seen: string[] = [];
    let cursor = '';
    for (let page = 0; page < 5; page++) {
      const response = await call(getStudies, {
        token: bearer,
        path: `/?limit=2${cursor && `&cursor=${cursor}`}`,
      });
      const { items, nextCursor } = (await response.json()) as {
        items: { id: string }[];
        nextCursor: string | null;
      };
      seen.push(...items.map(({ id }) => id));
      if (nextCursor === null) break;
      cursor = nextCursor;
    }
    expect(seen).toEqual(made);
    const foreign = await insertLab();
    const study = await insertStudy(foreign);
    expect((await call(getAnimals, { token: bearer, path: `/?studyId=${study}` })).status).toBe(404);
  });
});

describe('versions', () => {
  it('asks for the version, refuses a stale one, and moves it on', async () => {
    const id = await insertStudy(lead);
    const read = await call(getStudy, { token, params: { id } });
    expect(read.headers.get('etag')).toBe('"v1"');
    const patch = (headers: Record<string, string>) =>
      call(patchStudy, { method: 'PATCH', token, params: { id }, headers, body: { name: 'Renamed' } });
    expect((await patch({})).status).toBe(428);
    expect((await patch({ 'if-match': '"v9"' })).status).toBe(412);
    expect((await patch({ 'if-match': '*' })).status).toBe(412);
    const changed = await patch({ 'if-match': '"v1"' });
    expect(changed.status).toBe(200);
    expect(changed.headers.get('etag')).toBe('"v2"');
    expect((await patch({ 'if-match': '"v1"' })).status).toBe(412);
    expect(await json(await call(getStudy, { token, params: { id } }))).toMatchObject({
      name: 'Renamed',
      version: 2,
    });
    const unchanged = await call(getStudy, { token, params: { id }, headers: { 'if-none-match': '"v2"' } });
    expect(unchanged.status).toBe(304);
  });
});

describe('idempotency', () => {
  it('carries a request out once per key and gives the same answer again', async () => {
    const send = (key: string, body: unknown) =>
      call(postStudy, { method: 'POST', token, headers: { 'idempotency-key': key }, body });
    const before = await db()('studies').where({ lab_id: lead.labId }).count({ n: '*' }).first();
    const first = await send('night-1', newStudy);
    const again = await send('night-1', newStudy);
    expect([first.status, again.status]).toEqual([201, 201]);
    expect(again.headers.get('idempotency-replayed')).toBe('true');
    expect(await again.text()).toBe(await first.text());
    const after = await db()('studies').where({ lab_id: lead.labId }).count({ n: '*' }).first();
    expect(Number(after!.n)).toBe(Number(before!.n) + 1);
    expect((await send('night-1', { ...newStudy, name: 'Other' })).status).toBe(409);
    expect((await send('bad key', newStudy)).status).toBe(400);
  });

  it('lets one of many parallel repeats through', async () => {
    const answers = await Promise.all(
      Array.from({ length: 8 }, () =>
        call(postStudy, {
          method: 'POST',
          token,
          headers: { 'idempotency-key': 'parallel' },
          body: { name: 'Once only' },
        }),
      ),
    );
    expect(answers.every(({ status }) => status === 201 || status === 409)).toBe(true);
    const rows = await db()('studies').where({ lab_id: lead.labId, name: 'Once only' });
    expect(rows).toHaveLength(1);
  });

  it('repeats a refusal, keeps keys apart by member, and never keeps a token', async () => {
    const body = { studyId: lead.labId, code: 'A1', species: 'Mus musculus', sex: 'male' };
    const send = () => call(postAnimal, { method: 'POST', token, headers: { 'idempotency-key': 'k' }, body });
    expect((await send()).status).toBe(404);
    const replayed = await send();
    expect([replayed.status, replayed.headers.get('idempotency-replayed')]).toEqual([404, 'true']);
    const other = await insertLab();
    const theirs = await call(postStudy, {
      method: 'POST',
      token: await tokenFor(other, ['manage']),
      headers: { 'idempotency-key': 'k' },
      body: newStudy,
    });
    expect(theirs.status).toBe(201);

    const wanted = { name: 'rig', scopes: ['read'], expiresAt: new Date(Date.now() + 60_000).toISOString() };
    const make = () =>
      call(postToken, { method: 'POST', token, headers: { 'idempotency-key': 't' }, body: wanted });
    const made = await make();
    expect(made.status).toBe(201);
    const secret = String((await json(made)).token);
    expect((await make()).status).toBe(409);
    const kept = await db()('idempotency_keys').select('response');
    expect(JSON.stringify(kept)).not.toContain(secret);
  });
});
