import { closeInvitation, findInvitation } from '@/db/repositories/invitations';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { AppError } from '@/lib/errors/app-error';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';

/** Takes an open invitation back: its link is worth nothing from now on. */
export async function revokeInvitation(ctx: Ctx, input: { invitationId: string }): Promise<void> {
  authorize(ctx, 'member.invite');
  await inTransaction(async (trx) => {
    const row = await findInvitation(trx, ctx.actor.labId, input.invitationId);
    if (row === null) throw notFound();
    if (!(await closeInvitation(trx, row.id, { revoked_at: new Date() })))
      throw new AppError('conflict', 'This invitation is closed already.');
    await writeAudit(trx, ctx, {
      action: 'member.revokeInvitation',
      subjectKind: 'invitation',
      subjectId: row.id,
      detail: { email: row.email },
    });
  });
}
