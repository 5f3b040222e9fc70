import { v7 } from 'uuid';
import { db } from '@/db/connection';
import { closeInvitation } from '@/db/repositories/invitations';
import { findMember, insertMembership } from '@/db/repositories/memberships';
import { findUserByEmail, insertUser } from '@/db/repositories/users';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { hashPassword } from '@/lib/auth/hash-password';
import { requireGoodPassword } from '@/lib/auth/require-good-password';
import { verifyPassword } from '@/lib/auth/verify-password';
import type { AcceptInvitation } from '@/lib/contracts/account';
import { AppError } from '@/lib/errors/app-error';
import { limitRate } from '@/lib/http/limit-rate';
import { openInvitation } from './open-invitation';

const budget = { name: 'accept-invitation', points: 10, seconds: 15 * 60 };

/**
 * Accepts an invitation by its link. A new address gets an account with the given name and password; an address that
 * has one joins the lab with its own password. The link proves that the address is the reader's.
 */
export async function acceptInvitation(
  input: AcceptInvitation & { requestId: string },
): Promise<{ email: string; labName: string }> {
  const invitation = await openInvitation(db(), input.token);
  await limitRate(budget, invitation.id);
  const { lab_id: labId, email, role } = invitation;
  const known = await findUserByEmail(db(), email);
  const userId = known?.id ?? v7();
  let passwordHash = '';
  if (known === null) {
    if (input.name === undefined)
      throw new AppError('invalid-input', 'A name is needed for the new account.', {
        faults: [{ pointer: '/name', code: 'missing', detail: 'a name is needed for the new account' }],
      });
    requireGoodPassword(input.password, [input.name, email, invitation.lab_name], '/password');
    passwordHash = await hashPassword(input.password);
  } else if (!(await verifyPassword(input.password, known.password_hash)))
    throw new AppError('invalid-input', 'This address has an account already; its password is another one.', {
      faults: [{ pointer: '/password', code: 'wrong-password', detail: 'not the password of this account' }],
    });

  await inTransaction(async (trx) => {
    if (!(await closeInvitation(trx, invitation.id, { accepted_at: new Date() })))
      throw new AppError('conflict', 'This invitation has just been used or taken back.');
    if (known === null)
      await insertUser(trx, { id: userId, email, name: input.name ?? '', password_hash: passwordHash });
    if ((await findMember(trx, labId, userId)) === null)
      await insertMembership(trx, { lab_id: labId, user_id: userId, role });
    await writeAudit(
      trx,
      { actor: { labId, userId }, requestId: input.requestId },
      {
        action: 'member.join',
        subjectKind: 'user',
        subjectId: userId,
        detail: { invitationId: invitation.id, role },
      },
    );
  });
  return { email, labName: invitation.lab_name };
}
