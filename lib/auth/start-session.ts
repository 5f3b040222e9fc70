import { v7 } from 'uuid';
import { insertSignIn } from '@/db/repositories/sign-ins';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { Actor } from '@/lib/services/context';
import type { SessionClaims } from './session-claims';

/** Opens a browser session for somebody whose password fitted; gives Auth.js its user, with our claims. */
export async function startSession(
  outcome: { actor: Actor; epoch: number },
  request: { address: string; agent: string; requestId: string },
): Promise<{ id: string; name: string; email: string; claims: SessionClaims }> {
  const { actor, epoch } = outcome;
  const now = new Date();
  const signInId = v7();
  await inTransaction(async (trx) => {
    await insertSignIn(trx, {
      id: signInId,
      user_id: actor.userId,
      lab_id: actor.labId,
      agent: request.agent.slice(0, 300),
      address: request.address.slice(0, 60),
      last_seen_at: now,
    });
    await writeAudit(
      trx,
      { actor, requestId: request.requestId },
      { action: 'account.signIn', subjectKind: 'user', subjectId: actor.userId, detail: { signInId } },
    );
  });
  return {
    id: actor.userId,
    name: actor.userName,
    email: actor.email,
    claims: {
      userId: actor.userId,
      labId: actor.labId,
      signInId,
      epoch,
      signedInAt: Math.floor(now.getTime() / 1000),
    },
  };
}
