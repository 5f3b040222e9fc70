import { endSignIn } from '@/db/repositories/sign-ins';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { SessionClaims } from './session-claims';

/** Ends the browser session of these claims, so that a copy of its cookie is worth nothing. */
export async function endSession(claims: SessionClaims, requestId: string): Promise<void> {
  await inTransaction(async (trx) => {
    const ended = await endSignIn(trx, claims.userId, claims.signInId, new Date());
    if (!ended) return;
    await writeAudit(
      trx,
      { actor: { labId: claims.labId, userId: claims.userId }, requestId },
      {
        action: 'account.signOut',
        subjectKind: 'user',
        subjectId: claims.userId,
        detail: { signInId: claims.signInId },
      },
    );
  });
}
