import type { Knex } from 'knex';
import type { PartRecord } from '@/lib/intake/canonical/part-record';

/** What a readout is made on: one data version of a session, and the animal's name for the verdict. */
export interface ReadoutSubject {
  sessionId: string;
  dataVersionId: string;
  dataVersion: number;
  dataHash: string;
  nTrials: number;
  nUnits: number;
  nBins: number;
  binWidthMs: number;
  windowStartMs: number;
  parts: PartRecord[];
  animalCode: string;
}

/** The session's newest data version, or null where the lab has no such session or it has no data yet. */
export async function findNewestSubject(
  q: Knex,
  labId: string,
  sessionId: string,
): Promise<ReadoutSubject | null> {
  const row = await subjects(q)
    .where({ 'd.session_id': sessionId, 'd.lab_id': labId })
    .orderBy('d.number', 'desc')
    .first();
  return row ? toSubject(row) : null;
}

export async function findSubject(
  q: Knex,
  labId: string,
  dataVersionId: string,
): Promise<ReadoutSubject | null> {
  const row = await subjects(q).where({ 'd.id': dataVersionId, 'd.lab_id': labId }).first();
  return row ? toSubject(row) : null;
}

/** The newest data of the other sessions of a session's study, in the order in which the sessions were made. */
export async function listSiblingSubjects(
  q: Knex,
  labId: string,
  sessionId: string,
  limit: number,
): Promise<ReadoutSubject[]> {
  const rows: Record<string, unknown>[] = await subjects(q)
    .where({ 'd.lab_id': labId })
    .andWhere(
      's.study_id',
      q('recording_sessions').select('study_id').where({ id: sessionId, lab_id: labId }),
    )
    .andWhereNot({ 's.id': sessionId })
    .andWhere('d.number', q.raw('(select max(n.number) from data_versions n where n.session_id = s.id)'))
    .orderBy('s.id')
    .limit(limit);
  return rows.map(toSubject);
}

function subjects(q: Knex) {
  return q('data_versions as d')
    .join('recording_sessions as s', 's.id', 'd.session_id')
    .join('animals as a', 'a.id', 's.animal_id')
    .select(
      'd.id',
      'd.session_id',
      'd.number',
      'd.data_hash',
      'd.n_trials',
      'd.n_units',
      'd.n_bins',
      'd.bin_width_ms',
      'd.window_start_ms',
      'd.parts',
      'a.code',
    );
}

function toSubject(row: Record<string, unknown>): ReadoutSubject {
  return {
    sessionId: row.session_id as string,
    dataVersionId: row.id as string,
    dataVersion: row.number as number,
    dataHash: row.data_hash as string,
    nTrials: row.n_trials as number,
    nUnits: row.n_units as number,
    nBins: row.n_bins as number,
    binWidthMs: row.bin_width_ms as number,
    windowStartMs: row.window_start_ms as number,
    parts: (typeof row.parts === 'string' ? JSON.parse(row.parts) : row.parts) as PartRecord[],
    animalCode: row.code as string,
  };
}
