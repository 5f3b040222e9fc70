import { changeMembershipRole, countLeadsLocked, findMember } from '@/db/repositories/memberships';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { ChangeMember } from '@/lib/contracts/account';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { requireLeadLeft } from './require-lead-left';

/** Gives a member another role, at once for all their sessions and tokens. A lab keeps at least one lead. */
export async function changeMember(ctx: Ctx, input: { userId: string; change: ChangeMember }): Promise<void> {
  authorize(ctx, 'member.change');
  const { labId } = ctx.actor;
  await inTransaction(async (trx) => {
    const nLeads = await countLeadsLocked(trx, labId);
    const member = await findMember(trx, labId, input.userId);
    if (member === null) throw notFound();
    if (member.role === input.change.role) return;
    if (member.role === 'lead') requireLeadLeft(nLeads);
    await changeMembershipRole(trx, labId, input.userId, input.change.role);
    await writeAudit(trx, ctx, {
      action: 'member.change',
      subjectKind: 'user',
      subjectId: input.userId,
      detail: { before: member.role, role: input.change.role },
    });
  });
}
