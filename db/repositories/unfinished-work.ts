import type { Knex } from 'knex';
import type { OutboxEntry } from './outbox';

type WorkKind = OutboxEntry['kind'];
export interface WorkRef {
  id: string;
  attempt: number;
}

/** Rows of each table that wait for a worker, and those that one has claimed. Files are read without a claim. */
const tables: Record<WorkKind, { table: string; waiting: string; claims: boolean }> = {
  'run-readout': { table: 'readouts', waiting: 'queued', claims: true },
  'run-intake': { table: 'intakes', waiting: 'queued', claims: true },
  'read-file': { table: 'files', waiting: 'reading', claims: false },
};

/** The oldest rows that have waited for longer than `olderThanMs`. Their job may be gone. */
export async function listWaitingWork(
  q: Knex,
  kind: WorkKind,
  olderThanMs: number,
  limit: number,
): Promise<WorkRef[]> {
  const { table, waiting, claims } = tables[kind];
  const rows = await q(table)
    .select('id', ...(claims ? ['attempts'] : []))
    .where({ state: waiting })
    .andWhere('created_at', '<', ago(q, olderThanMs))
    .orderBy('id')
    .limit(limit);
  return rows.map((row) => ({ id: row.id, attempt: row.attempts ?? 0 }));
}

/**
 * Gives back every claimed row whose heartbeat is older than `staleMs`: its worker was killed, or cannot reach the
 * database any more. The claim is lost with it, so that a worker that comes back writes nothing.
 */
export async function releaseStaleWork(
  trx: Knex.Transaction,
  kind: WorkKind,
  staleMs: number,
  limit: number,
): Promise<WorkRef[]> {
  const { table, waiting, claims } = tables[kind];
  if (!claims) return [];
  const isStale = (query: Knex.QueryBuilder) =>
    query.where({ state: 'running' }).andWhere('heartbeat_at', '<', ago(trx, staleMs));
  // First without locks, then by primary key: a locking scan would hold up everybody who renews a claim.
  const found: { id: string }[] = await isStale(trx(table).select('id')).orderBy('id').limit(limit);
  if (found.length === 0) return [];
  const rows: { id: string; attempts: number }[] = await isStale(trx(table).select('id', 'attempts'))
    .whereIn(
      'id',
      found.map(({ id }) => id),
    )
    .forUpdate()
    .skipLocked();
  const ids = rows.map((row) => row.id);
  if (ids.length > 0)
    await trx(table).whereIn('id', ids).update({ state: waiting, claimed_by: null, heartbeat_at: null });
  return rows.map((row) => ({ id: row.id, attempt: row.attempts }));
}

function ago(q: Knex, ms: number): Knex.Raw {
  return q.raw('timestampadd(microsecond, ?, current_timestamp(3))', [-Math.round(ms) * 1_000]);
}
