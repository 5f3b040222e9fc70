import { createHash } from 'node:crypto';
import knex, { type Knex } from 'knex';
import { env } from '@/lib/env/env';
import { MariaClient } from '@/db/maria-client';
import { connectionOptions } from '@/db/connection-options';

interface Pool {
  key: string;
  knex: Knex;
}
const shared = globalThis as typeof globalThis & { outfoldPool?: Pool };

/**
 * The one pool of MariaDB connections of this process (kept on globalThis: a bundler may load this module twice).
 * DATETIME columns come and go as Date in UTC, DATE as 'YYYY-MM-DD', BIGINT as number while it is safe, JSON parsed;
 * arrays and objects must be JSON.stringify'd on the way in. A server that is away throws AppError('unavailable').
 */
export function db(): Knex {
  const url = env().DATABASE_URL;
  const key = createHash('sha256').update(url).digest('hex');
  if (shared.outfoldPool?.key !== key) {
    void shared.outfoldPool?.knex.destroy();
    shared.outfoldPool = {
      key,
      knex: knex({
        client: MariaClient as unknown as typeof Knex.Client,
        connection: connectionOptions(url) as Knex.MySql2ConnectionConfig,
        pool: { min: 0, max: 10, idleTimeoutMillis: 30_000 },
        acquireConnectionTimeout: 10_000,
        asyncStackTraces: false,
      }),
    };
  }
  return shared.outfoldPool.knex;
}

/** Closes the pool: at the end of the worker and of tests. The next db() opens a new one. */
export async function closeDb(): Promise<void> {
  const pool = shared.outfoldPool;
  shared.outfoldPool = undefined;
  await pool?.knex.destroy();
}
