import type { Knex } from 'knex';

export interface AuditRow {
  id: number;
  lab_id: string | null;
  actor_id: string | null;
  action: string;
  subject_kind: string;
  subject_id: string;
  detail: unknown;
  request_id: string | null;
  created_at: Date;
  previous_hash: string | null;
  hash: string;
}

/** The chain of what belongs to no lab (a sign-in under an unknown address, say). */
export const noLabChain = '00000000-0000-0000-0000-000000000000';

/** Locks a chain's head until the transaction ends, so that the chain stays linear; makes it where it is missing. */
export async function lockAuditHead(
  trx: Knex.Transaction,
  chainId: string,
): Promise<{ entryCount: number; hash: string | null }> {
  // Not `insert ignore` and not `select` first: both take a shared or gap lock here, and two writers would then each
  // wait for the other. This statement takes the exclusive lock of the row at once, whether it is new or not.
  await trx.raw(
    'insert into audit_heads (chain_id, entry_count, hash) values (?, 0, null) on duplicate key update chain_id = chain_id',
    [chainId],
  );
  const row = await trx<{ chain_id: string; entry_count: number; hash: string | null }>('audit_heads')
    .where({ chain_id: chainId })
    .forUpdate()
    .first();
  if (row === undefined) throw new Error(`the audit chain ${chainId} has no head`);
  return { entryCount: Number(row.entry_count), hash: row.hash };
}

/** Appends a row and moves its chain's head on to it. */
export async function appendAuditEntry(
  trx: Knex.Transaction,
  chainId: string,
  row: Omit<AuditRow, 'id'>,
  entryCount: number,
): Promise<void> {
  await trx('audit_entries').insert({ ...row, detail: JSON.stringify(row.detail) });
  await trx('audit_heads').where({ chain_id: chainId }).update({ entry_count: entryCount, hash: row.hash });
}

/** The heads of all chains. */
export async function listAuditHeads(
  q: Knex,
): Promise<{ chainId: string; entryCount: number; hash: string | null }[]> {
  const rows = await q<{ chain_id: string; entry_count: number; hash: string | null }>('audit_heads').orderBy(
    'chain_id',
  );
  return rows.map((row) => ({ chainId: row.chain_id, entryCount: Number(row.entry_count), hash: row.hash }));
}

/** Up to `limit` rows of one chain, oldest first, after the row `afterId`. */
export async function listAuditChain(
  q: Knex,
  chainId: string,
  afterId: number,
  limit: number,
): Promise<AuditRow[]> {
  const query = q<AuditRow>('audit_entries').where('id', '>', afterId).orderBy('id').limit(limit);
  return chainId === noLabChain ? query.whereNull('lab_id') : query.where('lab_id', chainId);
}

/** One lab's rows, newest first, before the row `beforeId`. */
export async function listAuditEntries(
  q: Knex,
  labId: string,
  beforeId: number | null,
  limit: number,
): Promise<(AuditRow & { actor_name: string | null })[]> {
  const query = q('audit_entries as a')
    .leftJoin('users as u', 'u.id', 'a.actor_id')
    .where('a.lab_id', labId)
    .orderBy('a.id', 'desc')
    .limit(limit)
    .select('a.*', 'u.name as actor_name');
  if (beforeId !== null) void query.where('a.id', '<', beforeId);
  return query;
}

/** Chains that have rows but no head: somebody took the head away. */
export async function listChainlessLabs(q: Knex): Promise<string[]> {
  const rows = (await q('audit_entries as a')
    .leftJoin('audit_heads as h', 'h.chain_id', q.raw('coalesce(a.lab_id, ?)', [noLabChain]))
    .whereNull('h.chain_id')
    .distinct(q.raw('coalesce(a.lab_id, ?) as chain_id', [noLabChain]))) as { chain_id: string }[];
  return rows.map((row) => row.chain_id);
}
