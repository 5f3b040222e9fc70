import { endOtherSignIns as endRows } from '@/db/repositories/sign-ins';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { Ctx } from '@/lib/services/context';

/** Ends all browser sessions of the member but the one that asks. */
export async function endOtherSignIns(ctx: Ctx): Promise<{ ended: number }> {
  return inTransaction(async (trx) => {
    const ended = await endRows(trx, ctx.actor.userId, ctx.signInId ?? null, new Date());
    await writeAudit(trx, ctx, {
      action: 'account.endOtherSessions',
      subjectKind: 'user',
      subjectId: ctx.actor.userId,
      detail: { ended },
    });
    return { ended };
  });
}
