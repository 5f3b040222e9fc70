import type { Knex } from 'knex';
import type { Problem } from '@/lib/contracts/problem';
import type { ColumnFact, LabelFact, SessionState } from '@/lib/contracts/session';

export interface RecordingSessionRow {
  id: string;
  lab_id: string;
  study_id: string;
  animal_id: string;
  name: string;
  started_at: Date;
  state: SessionState;
  problems: Problem[];
  version: number;
  created_by: string;
  created_at: Date;
}

/** A session with its animal's code and the facts of its newest data version, null where it has no data yet. */
export interface SessionRow extends RecordingSessionRow {
  animal_code: string;
  data_version: number | null;
  data_hash: string | null;
  counts_hash: string | null;
  n_trials: number | null;
  n_units: number | null;
  n_bins: number | null;
  bin_width_ms: number | null;
  window_start_ms: number | null;
  trial_columns: ColumnFact[] | null;
  unit_columns: ColumnFact[] | null;
  labels: LabelFact[] | null;
}

export async function insertRecordingSession(
  trx: Knex,
  row: Pick<
    RecordingSessionRow,
    'id' | 'lab_id' | 'study_id' | 'animal_id' | 'name' | 'started_at' | 'created_by' | 'created_at'
  >,
): Promise<void> {
  await trx('recording_sessions').insert({ ...row, problems: '[]' });
}

function sessions(q: Knex): Knex.QueryBuilder {
  return q('recording_sessions as s')
    .join('animals as a', 'a.id', 's.animal_id')
    .leftJoin('data_versions as d', (on) =>
      on
        .on('d.session_id', 's.id')
        .andOn('d.number', q.raw('(select max(n.number) from data_versions n where n.session_id = s.id)')),
    )
    .select(
      's.id',
      's.lab_id',
      's.study_id',
      's.animal_id',
      's.name',
      's.started_at',
      's.state',
      's.problems',
      's.version',
      's.created_by',
      's.created_at',
      'a.code as animal_code',
      'd.number as data_version',
      'd.data_hash',
      'd.counts_hash',
      'd.n_trials',
      'd.n_units',
      'd.n_bins',
      'd.bin_width_ms',
      'd.window_start_ms',
      'd.trial_columns',
      'd.unit_columns',
      'd.labels',
    );
}

export async function findSession(q: Knex, labId: string, sessionId: string): Promise<SessionRow | null> {
  const row = (await sessions(q).where({ 's.lab_id': labId, 's.id': sessionId }).first()) as
    SessionRow | undefined;
  return row ?? null;
}

/** A study's sessions (all of the lab's where `studyId` is null), newest first, before the id `beforeId`. */
export async function listSessionRows(
  q: Knex,
  labId: string,
  studyId: string | null,
  beforeId: string | null,
  limit: number,
): Promise<SessionRow[]> {
  const query = sessions(q).where({ 's.lab_id': labId }).orderBy('s.id', 'desc').limit(limit);
  if (studyId !== null) void query.where({ 's.study_id': studyId });
  if (beforeId !== null) void query.where('s.id', '<', beforeId);
  return query;
}

/** Locks the session's row until the transaction ends; false where the lab has no such session. */
export async function lockSession(trx: Knex.Transaction, labId: string, sessionId: string): Promise<boolean> {
  const row = await trx('recording_sessions').where({ lab_id: labId, id: sessionId }).forUpdate().first('id');
  return row !== undefined;
}

/** Changes the session if it is still at `version`; false where somebody was faster. */
export async function updateSession(
  trx: Knex,
  labId: string,
  sessionId: string,
  version: number,
  change: Partial<Pick<RecordingSessionRow, 'name' | 'started_at'>>,
): Promise<boolean> {
  const changed = await trx('recording_sessions')
    .where({ lab_id: labId, id: sessionId, version })
    .update({ ...change, version: version + 1 });
  return changed === 1;
}
