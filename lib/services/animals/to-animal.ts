import type { AnimalRow } from '@/db/repositories/animals';
import type { Animal } from '@/lib/contracts/lab';

export function toAnimal(row: AnimalRow): Animal {
  return {
    id: row.id,
    studyId: row.study_id,
    code: row.code,
    species: row.species,
    sex: row.sex,
    bornOn: row.born_on,
    createdAt: row.created_at.toISOString(),
    version: row.version,
  };
}
