import { v7 } from 'uuid';
import { db } from '@/db/connection';
import { addMail } from '@/db/repositories/mails';
import { endOtherSignIns } from '@/db/repositories/sign-ins';
import { findUser, setPasswordHash } from '@/db/repositories/users';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { hashPassword } from '@/lib/auth/hash-password';
import { requireGoodPassword } from '@/lib/auth/require-good-password';
import { verifyPassword } from '@/lib/auth/verify-password';
import type { ChangePassword } from '@/lib/contracts/account';
import { AppError } from '@/lib/errors/app-error';
import { limitRate } from '@/lib/http/limit-rate';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';

const budget = { name: 'password-change', points: 10, seconds: 15 * 60 };

/**
 * A new password for the member who is signed in and knows the present one. All other browser sessions end; tokens
 * stay, they are revoked one by one. A mail tells the member, in case it was somebody else.
 */
export async function changePassword(ctx: Ctx, input: ChangePassword): Promise<void> {
  const { userId, labName } = ctx.actor;
  await limitRate(budget, userId);
  const user = await findUser(db(), userId);
  if (user === null) throw notFound();
  if (!(await verifyPassword(input.present, user.password_hash)))
    throw new AppError('invalid-input', 'The present password is not right.', {
      faults: [{ pointer: '/present', code: 'wrong-password', detail: 'this is not your present password' }],
    });
  requireGoodPassword(input.next, [user.name, user.email, labName], '/next');
  const passwordHash = await hashPassword(input.next);
  await inTransaction(async (trx) => {
    await setPasswordHash(trx, userId, passwordHash);
    const ended = await endOtherSignIns(trx, userId, ctx.signInId ?? null, new Date());
    await addMail(trx, {
      id: v7(),
      kind: 'password-changed',
      recipient: user.email,
      payload: { id: userId },
    });
    await writeAudit(trx, ctx, {
      action: 'account.changePassword',
      subjectKind: 'user',
      subjectId: userId,
      detail: { endedSessions: ended },
    });
  });
}
