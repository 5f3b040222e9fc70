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

/**
 * Takes up to `limit` entries that are due, oldest first, for `leaseSeconds`; entries that another relay is taking are
 * passed over. An entry that is not marked as sent within the lease is due again.
 */
export async function leaseOutbox(q: Knex, limit: number, leaseSeconds: number): Promise<OutboxRow[]> {
  // Read committed: the default level would lock gaps of the index and hold up everybody who adds an entry.
  return q.transaction(
    async (trx) => {
      const rows = await trx('outbox')
        .select('id', 'kind', 'payload', 'attempts')
        .whereNull('sent_at')
        .andWhere('next_at', '<=', trx.raw('current_timestamp(3)'))
        .orderBy('id')
        .limit(limit)
        .forUpdate()
        .skipLocked();
      const entries = rows.map((row) => ({
        id: Number(row.id),
        kind: row.kind,
        payload: typeof row.payload === 'string' ? JSON.parse(row.payload) : row.payload,
        attempts: row.attempts,
      }));
      if (entries.length > 0)
        await trx('outbox')
          .whereIn(
            'id',
            entries.map(({ id }) => id),
          )
          .update({
            next_at: trx.raw('timestampadd(second, ?, current_timestamp(3))', [leaseSeconds]),
          });
      return entries;
    },
    { isolationLevel: 'read committed' },
  );
}

export async function markOutboxSent(q: Knex, ids: number[]): Promise<void> {
  if (ids.length > 0)
    await q('outbox')
      .whereIn('id', ids)
      .update({ sent_at: q.raw('current_timestamp(3)') });
}

/** Puts entries off: half a second after the first failure, twice as long each time, a quarter of a minute at most. */
export async function postponeOutbox(q: Knex, ids: number[]): Promise<void> {
  if (ids.length > 0)
    await q('outbox')
      .whereIn('id', ids)
      .update({
        attempts: q.raw('attempts + 1'),
        next_at: q.raw(
          'timestampadd(microsecond, least(15000000, 500000 * pow(2, least(attempts, 10))), current_timestamp(3))',
        ),
      });
}

/** Forgets entries that were sent more than a day ago. */
export async function purgeOutbox(q: Knex): Promise<void> {
  // By primary key: a deleting scan would lock gaps that new entries go into.
  const old: { id: number }[] = await q('outbox')
    .select('id')
    .where('sent_at', '<', q.raw('timestampadd(day, -1, current_timestamp(3))'))
    .limit(1_000);
  if (old.length > 0)
    await q('outbox')
      .whereIn(
        'id',
        old.map(({ id }) => id),
      )
      .delete();
}
