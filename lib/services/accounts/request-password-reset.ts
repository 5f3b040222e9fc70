import { v7 } from 'uuid';
import { db } from '@/db/connection';
import { addMail } from '@/db/repositories/mails';
import { listMemberships } from '@/db/repositories/memberships';
import { insertPasswordReset } from '@/db/repositories/password-resets';
import { findUserByEmail } from '@/db/repositories/users';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { limitRate } from '@/lib/http/limit-rate';

const lifetimeMs = 60 * 60 * 1000;
const addressBudget = { name: 'reset-address', points: 20, seconds: 60 * 60 };
const accountBudget = { name: 'reset-account', points: 3, seconds: 60 * 60 };

/**
 * Sends a link to set a new password, where the address has an account. The answer is the same either way, and so is
 * its time: the mail is only noted here and sent later.
 */
export async function requestPasswordReset(input: {
  email: string;
  address: string;
  requestId: string;
}): Promise<void> {
  await limitRate(addressBudget, input.address);
  await limitRate(accountBudget, input.email);
  const user = await findUserByEmail(db(), input.email);
  const membership = user === null ? undefined : (await listMemberships(db(), user.id)).at(0);
  const id = v7();
  await inTransaction(async (trx) => {
    if (user !== null && membership !== undefined) {
      await insertPasswordReset(trx, {
        id,
        user_id: user.id,
        expires_at: new Date(Date.now() + lifetimeMs),
      });
      await addMail(trx, { id: v7(), kind: 'password-reset', recipient: user.email, payload: { id } });
    }
    await writeAudit(
      trx,
      { actor: { labId: membership?.lab_id ?? null, userId: null }, requestId: input.requestId },
      {
        action: 'account.requestReset',
        subjectKind: 'user',
        subjectId: user?.id ?? 'unknown',
        detail: { address: input.address },
      },
    );
  });
}
