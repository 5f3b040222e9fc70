import type { Knex } from 'knex';

export interface StudyRow {
  id: string;
  lab_id: string;
  name: string;
  question: string;
  version: number;
  created_by: string;
  created_at: Date;
}

export async function insertStudy(
  trx: Knex,
  row: Pick<StudyRow, 'id' | 'lab_id' | 'name' | 'question' | 'created_by' | 'created_at'>,
): Promise<void> {
  await trx('studies').insert(row);
}

export async function findStudy(q: Knex, labId: string, studyId: string): Promise<StudyRow | null> {
  const row = await q<StudyRow>('studies').where({ lab_id: labId, id: studyId }).first();
  return row ?? null;
}

/** Newest first, before the id `beforeId`. */
export async function listStudyRows(
  q: Knex,
  labId: string,
  beforeId: string | null,
  limit: number,
): Promise<StudyRow[]> {
  const query = q<StudyRow>('studies').where({ lab_id: labId }).orderBy('id', 'desc').limit(limit);
  if (beforeId !== null) void query.where('id', '<', beforeId);
  return query;
}

/** Changes the study if it is still at `version`; false where somebody was faster. */
export async function updateStudy(
  trx: Knex,
  labId: string,
  studyId: string,
  version: number,
  change: Partial<Pick<StudyRow, 'name' | 'question'>>,
): Promise<boolean> {
  const changed = await trx('studies')
    .where({ lab_id: labId, id: studyId, version })
    .update({ ...change, version: version + 1 });
  return changed === 1;
}
