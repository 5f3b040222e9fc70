import { createHash } from 'node:crypto';
import knex, { type Knex } from 'knex';
import { env } from '@/lib/env/env';
import { log } from '@/lib/log/log';
import { MariaClient } from '@/db/maria-client';
import { connectionOptions } from '@/db/connection-options';

/** The pool or an open transaction: for signatures outside db/ (which do not import knex). */
export type Database = Knex;

interface Pool {
  key: string;
  knex: Knex;
}
// Every failure also reaches the caller; what knex says besides is for whoever looks for the cause.
const quietLog: Knex.Logger = {
  debug: (message: unknown) => log.trace({ message }, 'knex'),
  warn: (message: unknown) => log.debug({ message }, 'knex'),
  error: (message: unknown) => log.debug({ message }, 'knex'),
  deprecate: (method: unknown, alternative: unknown) => log.warn({ method, alternative }, 'knex: deprecated'),
};
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
        log: quietLog,
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
