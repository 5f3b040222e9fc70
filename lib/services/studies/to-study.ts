import type { StudyRow } from '@/db/repositories/studies';
import type { Study } from '@/lib/contracts/lab';

export function toStudy(row: StudyRow): Study {
  return {
    id: row.id,
    name: row.name,
    question: row.question,
    createdAt: row.created_at.toISOString(),
    version: row.version,
  };
}
