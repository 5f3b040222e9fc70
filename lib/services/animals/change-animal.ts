import { findAnimal, updateAnimal } from '@/db/repositories/animals';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { Animal, ChangeAnimal } from '@/lib/contracts/lab';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { requireDateInRange } from '@/lib/services/require-date-in-range';
import { staleVersion } from '@/lib/services/stale-version';
import { refuseTakenCode } from './refuse-taken-code';
import { toAnimal } from './to-animal';

/** Changes an animal's facts, if it is still at the version that the member saw. */
export async function changeAnimal(
  ctx: Ctx,
  input: { animalId: string; ifVersion: number; change: ChangeAnimal },
): Promise<Animal> {
  authorize(ctx, 'animal.change');
  const { bornOn, ...rest } = input.change;
  if (bornOn) requireDateInRange(bornOn, '/bornOn');
  const change = bornOn === undefined ? rest : { ...rest, born_on: bornOn };
  return inTransaction(async (trx) => {
    const before = await findAnimal(trx, ctx.actor.labId, input.animalId);
    if (before === null) throw notFound();
    const changed = await updateAnimal(trx, ctx.actor.labId, before.id, input.ifVersion, change).catch(
      (error: unknown) => refuseTakenCode(error, input.change.code ?? before.code),
    );
    if (!changed) throw staleVersion();
    await writeAudit(trx, ctx, {
      action: 'animal.change',
      subjectKind: 'animal',
      subjectId: before.id,
      detail: {
        before: { code: before.code, species: before.species, sex: before.sex, bornOn: before.born_on },
        change: input.change,
      },
    });
    return toAnimal({ ...before, ...change, version: input.ifVersion + 1 });
  });
}
