import { v7 } from 'uuid';
import { db } from '@/db/connection';
import { addMail } from '@/db/repositories/mails';
import { listMemberships } from '@/db/repositories/memberships';
import { findPasswordReset, usePasswordResets } from '@/db/repositories/password-resets';
import { endOtherSignIns } from '@/db/repositories/sign-ins';
import { findUser, changePasswordHash } from '@/db/repositories/users';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { hashPassword } from '@/lib/auth/hash-password';
import { readLinkToken } from '@/lib/auth/link-token';
import { requireGoodPassword } from '@/lib/auth/require-good-password';
import type { ResetPassword } from '@/lib/contracts/account';
import { AppError } from '@/lib/errors/app-error';

/** A new password by a link from a mail. The link works once; every browser session of the account ends. */
export async function resetPassword(input: ResetPassword & { requestId: string }): Promise<void> {
  const id = readLinkToken('password-reset', input.token);
  const reset = id === null ? null : await findPasswordReset(db(), id);
  const user = reset === null ? null : await findUser(db(), reset.user_id);
  if (reset === null || user === null || reset.used_at !== null || reset.expires_at <= new Date())
    throw outdated();
  const memberships = await listMemberships(db(), user.id);
  const labNames = memberships.map(({ lab_name }) => lab_name);
  requireGoodPassword(input.password, [user.name, user.email, ...labNames], '/password');
  const passwordHash = await hashPassword(input.password);
  await inTransaction(async (trx) => {
    const now = new Date();
    if (!(await usePasswordResets(trx, user.id, reset.id, now))) throw outdated();
    await changePasswordHash(trx, user.id, passwordHash);
    await endOtherSignIns(trx, user.id, null, now);
    await addMail(trx, {
      id: v7(),
      kind: 'password-changed',
      recipient: user.email,
      payload: { id: user.id },
    });
    await writeAudit(
      trx,
      { actor: { labId: memberships.at(0)?.lab_id ?? null, userId: user.id }, requestId: input.requestId },
      { action: 'account.resetPassword', subjectKind: 'user', subjectId: user.id },
    );
  });
}

function outdated(): AppError {
  return new AppError(
    'not-found',
    'This link is not valid any more: it was used, or its hour is over. Ask for a new one.',
  );
}
