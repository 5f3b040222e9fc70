import { db } from '@/db/connection';
import { listLiveSignIns } from '@/db/repositories/sign-ins';
import { sessionIdleMs } from '@/lib/auth/session-times';
import type { SignIn } from '@/lib/contracts/account';
import type { Ctx } from '@/lib/services/context';

/** The member's own browser sessions that are still open, newest first. */
export async function listSignIns(ctx: Ctx): Promise<{ items: SignIn[] }> {
  const rows = await listLiveSignIns(db(), ctx.actor.userId, new Date(Date.now() - sessionIdleMs));
  return {
    items: rows.map((row) => ({
      id: row.id,
      agent: row.agent,
      address: row.address,
      createdAt: row.created_at.toISOString(),
      lastSeenAt: row.last_seen_at.toISOString(),
      isThisOne: row.id === ctx.signInId,
    })),
  };
}
