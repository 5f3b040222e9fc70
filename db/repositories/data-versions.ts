import type { Knex } from 'knex';
import type { Problem } from '@/lib/contracts/problem';
import type { ColumnFact, LabelFact } from '@/lib/contracts/session';
import type { PartRecord } from '@/lib/intake/canonical/part-record';

export interface DataVersionRow {
  id: string;
  lab_id: string;
  session_id: string;
  intake_id: string;
  number: number;
  data_hash: string;
  counts_hash: string;
  n_trials: number;
  n_units: number;
  n_bins: number;
  bin_width_ms: number;
  window_start_ms: number;
  parts: PartRecord[];
  trial_columns: ColumnFact[];
  unit_columns: ColumnFact[];
  labels: LabelFact[];
  problems: Problem[];
  created_by: string;
  created_at: Date;
}

/**
 * Adds the session's next data version. The caller holds the session's row locked, so numbers run without gaps.
 * @returns its number
 */
export async function insertDataVersion(
  trx: Knex,
  row: Omit<DataVersionRow, 'number' | 'created_at'>,
): Promise<number> {
  const newest = (await trx('data_versions')
    .where({ session_id: row.session_id })
    .max({ number: 'number' })
    .first()) as { number: number | null } | undefined;
  const number = (newest?.number ?? 0) + 1;
  await trx('data_versions').insert({
    ...row,
    number,
    parts: JSON.stringify(row.parts),
    trial_columns: JSON.stringify(row.trial_columns),
    unit_columns: JSON.stringify(row.unit_columns),
    labels: JSON.stringify(row.labels),
    problems: JSON.stringify(row.problems),
  });
  return number;
}

/** A data version of a session by its number; the newest where none is named. */
export async function findDataVersion(
  q: Knex,
  labId: string,
  sessionId: string,
  number?: number,
): Promise<DataVersionRow | null> {
  const query = q('data_versions').where({ lab_id: labId, session_id: sessionId }).orderBy('number', 'desc');
  if (number !== undefined) void query.where({ number });
  return ((await query.first()) as DataVersionRow | undefined) ?? null;
}
