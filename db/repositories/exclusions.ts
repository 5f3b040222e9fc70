import type { Knex } from 'knex';

export interface ExclusionRow {
  session_id: string;
  version: number;
  lab_id: string;
  action: 'leaveOut' | 'putBack';
  kind: 'trial' | 'unit';
  indices: number[];
  reason: string;
  author_id: string;
  created_at: Date;
}

export async function insertExclusion(trx: Knex, row: ExclusionRow): Promise<void> {
  await trx('exclusions').insert({ ...row, indices: JSON.stringify(row.indices) });
}

/** A session's entries in order, up to and with `upToVersion` (all where it is null). */
export async function listExclusionRows(
  q: Knex,
  labId: string,
  sessionId: string,
  upToVersion: number | null = null,
): Promise<(ExclusionRow & { author_name: string })[]> {
  const query = q('exclusions as e')
    .join('users as u', 'u.id', 'e.author_id')
    .where({ 'e.lab_id': labId, 'e.session_id': sessionId })
    .orderBy('e.version')
    .select('e.*', 'u.name as author_name');
  if (upToVersion !== null) void query.where('e.version', '<=', upToVersion);
  return query;
}
