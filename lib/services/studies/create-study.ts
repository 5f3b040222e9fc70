import { v7 } from 'uuid';
import { insertStudy } from '@/db/repositories/studies';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { CreateStudy, Study } from '@/lib/contracts/lab';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { toStudy } from './to-study';

export async function createStudy(ctx: Ctx, input: CreateStudy): Promise<Study> {
  authorize(ctx, 'study.create');
  const row = {
    id: v7(),
    lab_id: ctx.actor.labId,
    name: input.name,
    question: input.question,
    created_by: ctx.actor.userId,
    created_at: new Date(),
  };
  await inTransaction(async (trx) => {
    await insertStudy(trx, row);
    await writeAudit(trx, ctx, {
      action: 'study.create',
      subjectKind: 'study',
      subjectId: row.id,
      detail: { name: row.name },
    });
  });
  return toStudy({ ...row, version: 1 });
}
