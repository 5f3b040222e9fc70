import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { db } from '@/db/connection';
import { inTransaction } from '@/db/transaction';
import { AppError } from '@/lib/errors/app-error';
import { migrationSource } from '@/tests/support/migration-source';
import { control } from '@/tests/support/control';
import { insertLab, insertSession } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';

describe('the database', () => {
  let drop: () => Promise<void>;
  beforeAll(async () => {
    drop = await freshDatabase();
    await db().schema.createTable('things', (table) => {
      table.integer('id').primary();
      table.integer('amount').notNullable();
      table.bigInteger('big');
      table.specificType('moment', 'datetime(3)');
      table.date('day');
      table.json('facts');
      table.string('words', 100);
    });
  });
  afterAll(() => drop());

  it('keeps instants in UTC to the millisecond, days as text, big numbers, JSON and any script', async () => {
    const moment = new Date('2026-03-29T01:30:00.123Z');
    await db()('things').insert({
      id: 1,
      amount: 1,
      big: 9_007_199_254_740_991,
      moment,
      day: '2025-12-31',
      facts: JSON.stringify({ a: [1, null] }),
      words: 'σ² 🐁 Ünit',
    });
    const row = await db()('things').where({ id: 1 }).first();
    expect(row).toMatchObject({
      big: 9_007_199_254_740_991,
      moment,
      day: '2025-12-31',
      facts: { a: [1, null] },
      words: 'σ² 🐁 Ünit',
    });
  });

  it('rolls back when the work throws', async () => {
    await expect(
      inTransaction(async (trx) => {
        await trx('things').insert({ id: 2, amount: 2 });
        throw new AppError('conflict', 'no');
      }),
    ).rejects.toMatchObject({ code: 'conflict' });
    expect(await db()('things').where({ id: 2 })).toEqual([]);
  });

  it('runs the work again after a deadlock, so that both sides end', async () => {
    await db()('things').insert([
      { id: 10, amount: 0 },
      { id: 11, amount: 0 },
    ]);
    let runs = 0;
    let arrived = 0;
    let release!: () => void;
    const bothHoldOne = new Promise<void>((resolve) => (release = resolve));
    const work = (first: number, second: number) =>
      inTransaction(async (trx) => {
        runs++;
        await trx('things').where({ id: first }).increment('amount', 1);
        if (++arrived === 2) release();
        await bothHoldOne;
        await trx('things').where({ id: second }).increment('amount', 1);
      });
    await Promise.all([work(10, 11), work(11, 10)]);
    expect(runs).toBe(3);
    expect(await db()('things').whereIn('id', [10, 11]).pluck('amount')).toEqual([2, 2]);
  });

  it('goes back to nothing and forward again through its migrations', async () => {
    await insertSession(await insertLab());
    await db().migrate.rollback({ migrationSource }, true);
    expect(await db().schema.hasTable('labs')).toBe(false);
    await db().migrate.latest({ migrationSource });
    expect(await db()('recording_sessions')).toEqual([]);
  });

  it('says unavailable while it is away, and works again when it is back', async () => {
    const inFlight = inTransaction(async (trx) => {
      await trx('things').insert({ id: 20, amount: 1 });
      await control('mariadb', 'kill');
      await trx('things').insert({ id: 21, amount: 1 });
    });
    await expect(inFlight).rejects.toMatchObject({ code: 'unavailable', status: 503 });
    await expect(db()('things').first()).rejects.toMatchObject({ code: 'unavailable' });
    await expect(inTransaction((trx) => trx('things').first())).rejects.toMatchObject({
      code: 'unavailable',
    });
    await control('mariadb', 'start');
    expect(await db()('things').where('id', '>=', 20)).toEqual([]);
    expect(await db()('things').where({ id: 10 }).first()).toMatchObject({ amount: 2 });
  });
});
