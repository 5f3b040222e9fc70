import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeRedis, redis, workerConnection } from '@/lib/jobs/connection';
import { control } from '@/tests/support/control';
import { requireServices } from '@/tests/support/services';

describe('Redis', () => {
  beforeAll(requireServices);
  afterAll(() => closeRedis());

  it('fails fast for a producer while a worker waits until it is back', async () => {
    await redis().set('kept', '1');
    await control('redis', 'stop');
    const worker = workerConnection();
    let answered = false;
    const waiting = worker.get('kept').then((value) => {
      answered = true;
      return value;
    });
    const began = Date.now();
    await expect(redis().get('kept')).rejects.toThrow();
    expect(Date.now() - began).toBeLessThan(4_000);
    expect(answered).toBe(false);
    await control('redis', 'start');
    expect(await waiting).toBe('1');
    await expect
      .poll(
        () =>
          redis()
            .get('kept')
            .catch(() => 'away'),
        { timeout: 5_000 },
      )
      .toBe('1');
    worker.disconnect();
  });

  it('can lose its data on purpose', async () => {
    await redis().set('lost', '1');
    await control('redis', 'lose');
    await expect
      .poll(
        () =>
          redis()
            .get('lost')
            .catch(() => 'away'),
        { timeout: 5_000 },
      )
      .toBeNull();
  });

  it('refuses whoever has no password', async () => {
    const url = new URL(process.env.REDIS_URL!);
    const { Redis } = await import('ioredis');
    const stranger = new Redis({ host: url.hostname, port: Number(url.port), retryStrategy: () => null });
    stranger.on('error', () => {});
    await expect(stranger.get('kept')).rejects.toThrow(/NOAUTH/);
    stranger.disconnect();
  });
});
