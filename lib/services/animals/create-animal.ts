import { v7 } from 'uuid';
import { insertAnimal } from '@/db/repositories/animals';
import { findStudy } from '@/db/repositories/studies';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { Animal, CreateAnimal } from '@/lib/contracts/lab';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { requireDateInRange } from '@/lib/services/require-date-in-range';
import { refuseTakenCode } from './refuse-taken-code';
import { toAnimal } from './to-animal';

export async function createAnimal(ctx: Ctx, input: CreateAnimal): Promise<Animal> {
  authorize(ctx, 'animal.create');
  if (input.bornOn) requireDateInRange(input.bornOn, '/bornOn');
  const row = {
    id: v7(),
    lab_id: ctx.actor.labId,
    study_id: input.studyId,
    code: input.code,
    species: input.species,
    sex: input.sex,
    born_on: input.bornOn ?? null,
    created_by: ctx.actor.userId,
    created_at: new Date(),
  };
  await inTransaction(async (trx) => {
    if ((await findStudy(trx, ctx.actor.labId, input.studyId)) === null) throw notFound();
    await insertAnimal(trx, row).catch((error: unknown) => refuseTakenCode(error, input.code));
    await writeAudit(trx, ctx, {
      action: 'animal.create',
      subjectKind: 'animal',
      subjectId: row.id,
      detail: { studyId: row.study_id, code: row.code },
    });
  });
  return toAnimal({ ...row, version: 1 });
}
