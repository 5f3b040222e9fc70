import { findStudy, updateStudy } from '@/db/repositories/studies';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { ChangeStudy, Study } from '@/lib/contracts/lab';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { staleVersion } from '@/lib/services/stale-version';
import { toStudy } from './to-study';

/** Changes a study's name or question, if it is still at the version that the member saw. */
export async function changeStudy(
  ctx: Ctx,
  input: { studyId: string; ifVersion: number; change: ChangeStudy },
): Promise<Study> {
  authorize(ctx, 'study.change');
  return inTransaction(async (trx) => {
    const before = await findStudy(trx, ctx.actor.labId, input.studyId);
    if (before === null) throw notFound();
    if (!(await updateStudy(trx, ctx.actor.labId, before.id, input.ifVersion, input.change)))
      throw staleVersion();
    await writeAudit(trx, ctx, {
      action: 'study.change',
      subjectKind: 'study',
      subjectId: before.id,
      detail: { before: { name: before.name, question: before.question }, change: input.change },
    });
    return toStudy({ ...before, ...input.change, version: input.ifVersion + 1 });
  });
}
