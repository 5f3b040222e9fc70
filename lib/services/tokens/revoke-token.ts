import { findApiToken, revokeApiToken } from '@/db/repositories/api-tokens';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';

/** Ends one of the member's own tokens at once. Revoking it again changes nothing. */
export async function revokeToken(ctx: Ctx, input: { tokenId: string }): Promise<void> {
  authorize(ctx, 'token.revoke');
  const { labId, userId } = ctx.actor;
  await inTransaction(async (trx) => {
    const token = await findApiToken(trx, labId, userId, input.tokenId);
    if (token === null) throw notFound();
    if (!(await revokeApiToken(trx, labId, token.id, new Date()))) return;
    await writeAudit(trx, ctx, {
      action: 'token.revoke',
      subjectKind: 'token',
      subjectId: token.id,
      detail: { name: token.name },
    });
  });
}
