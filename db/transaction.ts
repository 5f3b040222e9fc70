import { setTimeout as pause } from 'node:timers/promises';
import type { Knex } from 'knex';
import { db } from '@/db/connection';

/** An open transaction, for signatures outside db/ (which do not import knex). */
export type Transaction = Knex.Transaction;

const retriedErrors = new Set([1213, 1205]); // deadlock found; lock wait timeout
const maxTries = 4;

/**
 * Runs `work` in one transaction: committed when it resolves, rolled back when it throws. After a deadlock or a lock
 * that did not come, all of `work` runs again (up to four times), so it must change nothing outside the transaction.
 */
export async function inTransaction<T>(work: (trx: Transaction) => Promise<T>): Promise<T> {
  for (let tried = 1; ; tried++) {
    try {
      return await db().transaction(work);
    } catch (error) {
      const { errno } = error as { errno?: number };
      if (tried >= maxTries || errno === undefined || !retriedErrors.has(errno)) throw error;
      await pause(tried * 20 + Math.random() * 40);
    }
  }
}
