import type { Knex } from 'knex';

/** Something that must reach the queue once the transaction that wrote it has been committed. */
export interface OutboxEntry {
  kind: 'run-readout' | 'read-file' | 'run-intake';
  payload: { id: string; attempt?: number };
}
export interface OutboxRow {
  id: number;
  kind: string;
  payload: { id: string; attempt?: number };
  attempts: number;
}

/** Adds an entry in the caller's transaction. It is sent after the commit, and not at all after a rollback. */
export async function addToOutbox(trx: Knex.Transaction, entry: OutboxEntry): Promise<void> {
  await trx('outbox').insert({
    kind: entry.kind,
    payload: JSON.stringify(entry.payload),
    next_at: trx.raw('current_timestamp(3)'),
  });
}

/** Locks up to `limit` entries that are due, oldest first; entries that another relay holds are passed over. */
export async function lockDueOutbox(trx: Knex.Transaction, limit: number): Promise<OutboxRow[]> {
  const rows = await trx('outbox')
    .select('id', 'kind', 'payload', 'attempts')
    .whereNull('sent_at')
    .andWhere('next_at', '<=', trx.raw('current_timestamp(3)'))
    .orderBy('id')
    .limit(limit)
    .forUpdate()
    .skipLocked();
  return rows.map((row) => ({
    id: Number(row.id),
    kind: row.kind,
    payload: typeof row.payload === 'string' ? JSON.parse(row.payload) : row.payload,
    attempts: row.attempts,
  }));
}

export async function markOutboxSent(trx: Knex.Transaction, ids: number[]): Promise<void> {
  if (ids.length > 0)
    await trx('outbox')
      .whereIn('id', ids)
      .update({ sent_at: trx.raw('current_timestamp(3)') });
}

/** Puts entries off: half a second after the first failure, twice as long each time, a quarter of a minute at most. */
export async function postponeOutbox(trx: Knex.Transaction, ids: number[]): Promise<void> {
  if (ids.length > 0)
    await trx('outbox')
      .whereIn('id', ids)
      .update({
        attempts: trx.raw('attempts + 1'),
        next_at: trx.raw(
          'timestampadd(microsecond, least(15000000, 500000 * pow(2, least(attempts, 10))), current_timestamp(3))',
        ),
      });
}

/** Forgets entries that were sent more than a day ago. */
export async function purgeOutbox(q: Knex): Promise<void> {
  await q('outbox')
    .whereNotNull('sent_at')
    .andWhere('sent_at', '<', q.raw('timestampadd(day, -1, current_timestamp(3))'))
    .limit(1_000)
    .delete();
}
