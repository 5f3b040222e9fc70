import { endSignIn } from '@/db/repositories/sign-ins';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';

/** Ends one of the member's own browser sessions at once. */
export async function endOwnSignIn(ctx: Ctx, input: { signInId: string }): Promise<void> {
  await inTransaction(async (trx) => {
    if (!(await endSignIn(trx, ctx.actor.userId, input.signInId, new Date()))) throw notFound();
    await writeAudit(trx, ctx, {
      action: 'account.endSession',
      subjectKind: 'user',
      subjectId: ctx.actor.userId,
      detail: { signInId: input.signInId },
    });
  });
}
