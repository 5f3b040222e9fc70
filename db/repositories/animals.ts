import type { Knex } from 'knex';

export interface AnimalRow {
  id: string;
  lab_id: string;
  study_id: string;
  code: string;
  species: string;
  sex: 'female' | 'male' | 'unknown';
  born_on: string | null;
  version: number;
  created_by: string;
  created_at: Date;
}

export async function insertAnimal(trx: Knex, row: Omit<AnimalRow, 'version'>): Promise<void> {
  await trx('animals').insert(row);
}

export async function findAnimal(q: Knex, labId: string, animalId: string): Promise<AnimalRow | null> {
  const row = await q<AnimalRow>('animals').where({ lab_id: labId, id: animalId }).first();
  return row ?? null;
}

/** A study's animals (all of the lab's where `studyId` is null), newest first, before the id `beforeId`. */
export async function listAnimalRows(
  q: Knex,
  labId: string,
  studyId: string | null,
  beforeId: string | null,
  limit: number,
): Promise<AnimalRow[]> {
  const query = q<AnimalRow>('animals').where({ lab_id: labId }).orderBy('id', 'desc').limit(limit);
  if (studyId !== null) void query.where({ study_id: studyId });
  if (beforeId !== null) void query.where('id', '<', beforeId);
  return query;
}

/** Changes the animal if it is still at `version`; false where somebody was faster. */
export async function updateAnimal(
  trx: Knex,
  labId: string,
  animalId: string,
  version: number,
  change: Partial<Pick<AnimalRow, 'code' | 'species' | 'sex' | 'born_on'>>,
): Promise<boolean> {
  const changed = await trx('animals')
    .where({ lab_id: labId, id: animalId, version })
    .update({ ...change, version: version + 1 });
  return changed === 1;
}
