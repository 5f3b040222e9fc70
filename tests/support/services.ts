import { randomBytes } from 'node:crypto';
import { Redis } from 'ioredis';
import knex, { type Knex } from 'knex';
import { closeDb, db } from '@/db/connection';
import { connectionOptions } from '@/db/connection-options';
import { migrationSource } from '@/tests/support/migration-source';

/**
 * Integration tests run inside `node scripts/with-services.mjs -- …` (npm test does it), which sets the addresses of
 * throw-away services in the environment.
 */
export function requireServices(): void {
  if (!process.env.DATABASE_URL || !process.env.OUTFOLD_CONTROL)
    throw new Error(
      'This test needs services. Run: node scripts/with-services.mjs -- npx vitest run --project integration <file>',
    );
}

/**
 * A new, migrated database of its own for the calling test file, and an empty Redis (which all files share, one after
 * the other); db() uses the database from here on. Call the returned function
 * in afterAll: it closes the pool and drops the database.
 */
export async function freshDatabase(): Promise<() => Promise<void>> {
  requireServices();
  const original = process.env.DATABASE_URL!;
  const name = `outfold_${randomBytes(6).toString('hex')}`;
  const admin = knex({
    client: 'mysql2',
    connection: connectionOptions(original) as Knex.MySql2ConnectionConfig,
    pool: { min: 0, max: 1 },
  });
  await admin.raw('create database ?? character set utf8mb4 collate utf8mb4_unicode_ci', [name]);
  await admin.destroy();
  const queue = new Redis(process.env.REDIS_URL!);
  await queue.flushall();
  queue.disconnect();

  const url = new URL(original);
  url.pathname = `/${name}`;
  process.env.DATABASE_URL = url.href;
  await db().migrate.latest({ migrationSource });
  return async () => {
    await db().raw('drop database if exists ??', [name]);
    await closeDb();
    process.env.DATABASE_URL = original;
  };
}
