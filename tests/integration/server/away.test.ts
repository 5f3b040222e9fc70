import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { GET as getHealth } from '@/app/api/health/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import { POST as postStudy } from '@/app/api/v1/studies/route';
import { db } from '@/db/connection';
import { announceWorker, withdrawWorker } from '@/lib/jobs/worker-presence';
import { control } from '@/tests/support/control';
import { insertLab, type LabRows } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';
import { call, cookieFor, tokenFor } from './support';

let drop: () => Promise<void>;
let lead: LabRows;
let token: string;
beforeAll(async () => {
  drop = await freshDatabase();
  lead = await insertLab();
  token = await tokenFor(lead, ['read', 'manage']);
});
afterAll(() => drop());

const parts = async (response: Response) =>
  ((await response.json()) as { parts: Record<string, string> }).parts;

describe('with all parts there', () => {
  it('health is ready only when a worker is alive too', async () => {
    await withdrawWorker('tested');
    const without = await call(getHealth, {});
    expect(without.status).toBe(503);
    expect(await parts(without)).toEqual({
      database: 'ready',
      queue: 'ready',
      store: 'ready',
      mail: 'ready',
      worker: 'away',
    });
    await announceWorker('tested');
    const response = await call(getHealth, {});
    expect(response.status).toBe(200);
    expect(await response.json()).toMatchObject({ state: 'ready' });
  });
});

describe('with the database away', () => {
  it('answers 503 with Retry-After, changes nothing, and goes on when it is back', async () => {
    const cookie = await cookieFor(lead);
    await control('mariadb', 'stop');
    try {
      for (const input of [
        { handler: getMe, call: { cookie } },
        { handler: getMe, call: { token } },
        {
          handler: postStudy,
          call: { method: 'POST', token, body: { name: 'Lost?' }, headers: { 'idempotency-key': 'away' } },
        },
      ] as const) {
        const response = await call(input.handler, input.call);
        expect(response.status).toBe(503);
        expect(Number(response.headers.get('retry-after'))).toBeGreaterThan(0);
        expect(response.headers.get('content-type')).toBe('application/problem+json');
        const text = await response.text();
        expect(text).not.toMatch(/ECONN|mysql|127\.0\.0\.1|at .*\.ts/i);
      }
      const health = await call(getHealth, {});
      expect([health.status, (await parts(health)).database]).toEqual([503, 'away']);
    } finally {
      await control('mariadb', 'start');
    }
    const again = await call(postStudy, {
      method: 'POST',
      token,
      body: { name: 'Lost?' },
      headers: { 'idempotency-key': 'away' },
    });
    expect(again.status).toBe(201);
    expect(await db()('studies').where({ name: 'Lost?' })).toHaveLength(1);
  });
});

describe('with Redis away', () => {
  it('still counts requests, in memory, and still answers', async () => {
    await control('redis', 'stop');
    try {
      const response = await call(getMe, { token });
      expect(response.status).toBe(200);
      expect(response.headers.get('ratelimit-limit')).toBe('1200');
      const health = await call(getHealth, {});
      expect(health.status).toBe(503);
      expect(await parts(health)).toMatchObject({ queue: 'away', worker: 'away', database: 'ready' });
    } finally {
      await control('redis', 'start');
    }
  });
});

describe('with the store or the mail server away', () => {
  it('health says which', async () => {
    for (const [service, part] of [
      ['object-store', 'store'],
      ['mail', 'mail'],
    ] as const) {
      await control(service, 'stop');
      try {
        const health = await call(getHealth, {});
        expect(health.status).toBe(503);
        expect(await parts(health)).toMatchObject({ [part]: 'away', database: 'ready' });
      } finally {
        await control(service, 'start');
      }
    }
  });
});
