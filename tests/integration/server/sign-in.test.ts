import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { GET as getMe } from '@/app/api/v1/me/route';
import { db } from '@/db/connection';
import { handleAuthRequest } from '@/lib/auth/handle-auth-request';
import { redis } from '@/lib/jobs/connection';
import { insertLab, type LabRows } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';
import { call, givePassword, origin, password } from './support';

let drop: () => Promise<void>;
let lead: LabRows;
beforeAll(async () => {
  drop = await freshDatabase();
  lead = await insertLab();
  await givePassword(lead);
});
afterAll(() => drop());

/** A browser's cookie jar over the account endpoints. */
function browser(address = '10.0.0.1') {
  const jar = new Map<string, string>();
  const send = async (path: string, form?: Record<string, string>, extra: Record<string, string> = {}) => {
    const headers = new Headers({
      host: '127.0.0.1:3000',
      'x-forwarded-for': address,
      cookie: [...jar].map(([name, value]) => `${name}=${value}`).join('; '),
      ...(form
        ? { origin, 'content-type': 'application/x-www-form-urlencoded', 'x-auth-return-redirect': '1' }
        : {}),
      ...extra,
    });
    const response = await handleAuthRequest(
      // As the framework hands it on: the address says localhost although the browser asked for 127.0.0.1.
      new Request(`http://localhost:3000${path}`, {
        method: form ? 'POST' : 'GET',
        headers,
        body: form ? new URLSearchParams(form) : undefined,
      }),
    );
    for (const line of response.headers.getSetCookie()) {
      const [pair] = line.split(';');
      const equals = pair.indexOf('=');
      const value = pair.slice(equals + 1);
      if (value === '') jar.delete(pair.slice(0, equals));
      else jar.set(pair.slice(0, equals), value);
    }
    return response;
  };
  const csrf = async () => ((await (await send('/api/auth/csrf')).json()) as { csrfToken: string }).csrfToken;
  return {
    jar,
    send,
    cookie: () => `outfold.session=${jar.get('outfold.session') ?? ''}`,
    signIn: async (email: string, secret: string) =>
      send('/api/auth/callback/credentials', {
        email,
        password: secret,
        csrfToken: await csrf(),
        callbackUrl: '/studies',
      }),
    signOut: async () => send('/api/auth/signout', { csrfToken: await csrf(), callbackUrl: '/sign-in' }),
  };
}
const urlOf = async (response: Response) => ((await response.json()) as { url: string }).url;

describe('signing in', () => {
  it('opens a session on the host that the browser used, with a cookie that scripts cannot read', async () => {
    const visitor = browser();
    const response = await visitor.signIn(`  ${lead.email.toUpperCase()} `, password);
    expect(response.status).toBe(200);
    const cookie = response.headers.getSetCookie().find((line) => line.startsWith('outfold.session='));
    expect(cookie).toMatch(/HttpOnly/i);
    expect(cookie).toMatch(/SameSite=Lax/i);
    expect(cookie).toMatch(/Path=\//i);
    expect(await urlOf(response)).toBe('http://127.0.0.1:3000/studies');
    const me = await call(getMe, { cookie: visitor.cookie() });
    expect(await me.json()).toMatchObject({ userId: lead.userId, role: 'lead' });
    expect(
      await db()('audit_entries').where({ action: 'account.signIn', actor_id: lead.userId }),
    ).toHaveLength(1);
  });

  it('says and sets the same for a wrong password and for an unknown account', async () => {
    const wrong = browser('10.0.0.2');
    const unknown = browser('10.0.0.2');
    const first = await wrong.signIn(lead.email, 'not the password');
    const second = await unknown.signIn('nobody@lab.test', 'not the password');
    expect([first.status, await urlOf(first)]).toEqual([second.status, await urlOf(second)]);
    expect(wrong.jar.has('outfold.session') || unknown.jar.has('outfold.session')).toBe(false);
    expect(await db()('audit_entries').where({ action: 'account.signInFailed' })).toHaveLength(2);
  });

  it('costs about the same time either way', async () => {
    const time = async (email: string, address: string) => {
      const visitor = browser(address);
      const startedAt = performance.now();
      await visitor.signIn(email, 'not the password');
      return performance.now() - startedAt;
    };
    // In turn, and the quickest of each: what else the machine does then weighs on both alike.
    const knownTimes: number[] = [];
    const unknownTimes: number[] = [];
    for (let n = 0; n < 5; n++) {
      knownTimes.push(await time(lead.email, `10.0.1.${n}`));
      unknownTimes.push(await time('nobody-else@lab.test', `10.0.2.${n}`));
    }
    const [known, unknown] = [Math.min(...knownTimes), Math.min(...unknownTimes)];
    // Without the decoy hash an unknown account would answer in a small fraction of the time.
    expect(unknown).toBeGreaterThan(known * 0.4);
    expect(unknown).toBeLessThan(known * 2.5);
  });

  it('ends on signing out, for copies of the cookie too', async () => {
    const visitor = browser();
    await visitor.signIn(lead.email, password);
    const copy = visitor.cookie();
    expect((await call(getMe, { cookie: copy })).status).toBe(200);
    await visitor.signOut();
    expect(visitor.jar.has('outfold.session')).toBe(false);
    expect((await call(getMe, { cookie: copy })).status).toBe(401);
  });

  it('refuses forged forms: no token, another origin, a foreign place to go to, a foreign host', async () => {
    const visitor = browser();
    const form = { email: lead.email, password, callbackUrl: '/' };
    await visitor.send('/api/auth/callback/credentials', form);
    expect(visitor.jar.has('outfold.session')).toBe(false);
    const crossSite = await visitor.send('/api/auth/callback/credentials', form, {
      origin: 'https://elsewhere.test',
    });
    expect(crossSite.status).toBe(403);
    const csrfToken = ((await (await visitor.send('/api/auth/csrf')).json()) as { csrfToken: string })
      .csrfToken;
    const away = await visitor.send('/api/auth/callback/credentials', {
      ...form,
      csrfToken,
      callbackUrl: 'https://elsewhere.test/',
    });
    expect(await urlOf(away)).toMatch(/^http:\/\/127\.0\.0\.1:3000/);
    expect((await visitor.send('/api/auth/csrf', undefined, { host: 'elsewhere.test' })).status).toBe(400);
    expect(
      (await visitor.send('/api/auth/callback/credentials', { ...form, pad: 'x'.repeat(20_000) })).status,
    ).toBe(413);
  });

  it('slows guessing down, per account and address, and lets the right password in elsewhere', async () => {
    const target = await insertLab();
    await givePassword(target);
    const guesser = browser('10.9.9.9');
    const statuses: number[] = [];
    for (let n = 0; n < 12; n++) statuses.push((await guesser.signIn(target.email, `guess ${n}`)).status);
    expect(statuses.slice(0, 10)).toEqual(Array(10).fill(200));
    expect(statuses.slice(10)).toEqual([429, 429]);
    const throttled = await guesser.signIn(target.email, password);
    expect(throttled.status).toBe(429);
    expect(Number(throttled.headers.get('retry-after'))).toBeGreaterThan(60);
    expect(await urlOf(throttled)).toContain('code=throttled');
    expect(
      (await browser('10.9.9.10').signIn(target.email, password)).headers.getSetCookie().join(),
    ).toContain('outfold.session=');
  });

  it('counts in Redis, so that every web server counts together', async () => {
    expect((await redis().keys('rate_sign-in-*')).length).toBeGreaterThan(0);
  });
});
