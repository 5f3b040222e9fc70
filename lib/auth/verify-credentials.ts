import { db } from '@/db/connection';
import { listMemberships } from '@/db/repositories/memberships';
import { findUserByEmail } from '@/db/repositories/users';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { limitRate, limiterOf } from '@/lib/http/limit-rate';
import type { Actor } from '@/lib/services/context';
import { verifyPassword } from './verify-password';

/** Tries from one address at one account, at one account from anywhere, and from one address at any account. */
const pairBudget = { name: 'sign-in-pair', points: 10, seconds: 15 * 60 };
const accountBudget = { name: 'sign-in-account', points: 50, seconds: 60 * 60 };
const addressBudget = { name: 'sign-in-address', points: 100, seconds: 15 * 60 };

/**
 * The member with this email and password, and the session epoch; null where they do not fit. Unknown accounts cost
 * the same time and give the same answer. Too many tries: `rate-limited`. Both outcomes are in the audit trail.
 */
export async function verifyCredentials(input: {
  email: string;
  password: string;
  address: string;
  requestId: string;
}): Promise<{ actor: Actor; epoch: number } | null> {
  const email = input.email.trim().toLowerCase().slice(0, 254);
  const pairKey = `${input.address}|${email}`;
  // Points are taken before the password is looked at, so that parallel tries cannot slip through together.
  await limitRate(addressBudget, input.address);
  await limitRate(pairBudget, pairKey);
  await limitRate(accountBudget, email);

  const user = await findUserByEmail(db(), email);
  const memberships = user === null ? [] : await listMemberships(db(), user.id);
  const fits =
    (await verifyPassword(input.password.slice(0, 1024), user?.password_hash ?? null)) &&
    memberships.length > 0;
  const member = memberships.at(0);
  if (!fits || user === null || member === undefined) {
    await inTransaction((trx) =>
      writeAudit(
        trx,
        { actor: { labId: member?.lab_id ?? null, userId: null }, requestId: input.requestId },
        {
          action: 'account.signInFailed',
          subjectKind: 'user',
          subjectId: user?.id ?? 'unknown',
          detail: { address: input.address },
        },
      ),
    );
    return null;
  }
  await limiterOf(pairBudget).delete(pairKey);
  await limiterOf(accountBudget).reward(email);
  await limiterOf(addressBudget).reward(input.address);
  return {
    epoch: user.session_epoch,
    actor: {
      kind: 'member',
      userId: user.id,
      userName: user.name,
      email: user.email,
      labId: member.lab_id,
      labName: member.lab_name,
      role: member.role,
      scopes: null,
    },
  };
}
