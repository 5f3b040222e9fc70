import { v7 } from 'uuid';
import { insertInvitation, revokeOpenInvitations } from '@/db/repositories/invitations';
import { addMail } from '@/db/repositories/mails';
import { findMember } from '@/db/repositories/memberships';
import { findUserByEmail } from '@/db/repositories/users';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { CreateInvitation, Invitation } from '@/lib/contracts/account';
import { AppError } from '@/lib/errors/app-error';
import { limitRate } from '@/lib/http/limit-rate';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { toInvitation } from './to-invitation';

const lifetimeMs = 7 * 24 * 60 * 60 * 1000;
/** A lab cannot be used to send mails to the world. */
const budget = { name: 'invitations', points: 50, seconds: 24 * 60 * 60 };

/** Invites an address to the lab in a role; a mail brings the link. An open invitation of the address is replaced. */
export async function createInvitation(ctx: Ctx, input: CreateInvitation): Promise<Invitation> {
  authorize(ctx, 'member.invite');
  const { labId, userId, userName } = ctx.actor;
  await limitRate(budget, labId);
  const now = new Date();
  const row = {
    id: v7(),
    lab_id: labId,
    email: input.email,
    role: input.role,
    invited_by: userId,
    expires_at: new Date(now.getTime() + lifetimeMs),
    created_at: now,
  };
  await inTransaction(async (trx) => {
    const known = await findUserByEmail(trx, input.email);
    if (known !== null && (await findMember(trx, labId, known.id)) !== null)
      throw new AppError('conflict', 'This address belongs to a member of the lab already.', {
        faults: [{ pointer: '/email', code: 'is-member', detail: 'is a member of the lab already' }],
      });
    await revokeOpenInvitations(trx, labId, input.email, now);
    await insertInvitation(trx, row);
    await addMail(trx, { id: v7(), kind: 'invitation', recipient: input.email, payload: { id: row.id } });
    await writeAudit(trx, ctx, {
      action: 'member.invite',
      subjectKind: 'invitation',
      subjectId: row.id,
      detail: { email: input.email, role: input.role },
    });
  });
  return toInvitation({ ...row, accepted_at: null, revoked_at: null, inviter_name: userName }, now);
}
