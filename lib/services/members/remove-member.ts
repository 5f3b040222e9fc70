import { countLeadsLocked, deleteMembership, findMember } from '@/db/repositories/memberships';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { requireLeadLeft } from './require-lead-left';

/**
 * Ends a membership: the member's sessions no longer open this lab and their tokens here die. What they did stays on
 * record under their name. A lab keeps at least one lead.
 */
export async function removeMember(ctx: Ctx, input: { userId: string }): Promise<void> {
  authorize(ctx, 'member.change');
  const { labId } = ctx.actor;
  await inTransaction(async (trx) => {
    const nLeads = await countLeadsLocked(trx, labId);
    const member = await findMember(trx, labId, input.userId);
    if (member === null) throw notFound();
    if (member.role === 'lead') requireLeadLeft(nLeads);
    await deleteMembership(trx, labId, input.userId);
    await writeAudit(trx, ctx, {
      action: 'member.remove',
      subjectKind: 'user',
      subjectId: input.userId,
      detail: { name: member.user_name, role: member.role },
    });
  });
}
