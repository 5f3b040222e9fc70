import { db } from '@/db/connection';
import { findSession } from '@/db/repositories/recording-sessions';
import type { Session } from '@/lib/contracts/session';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { toSession } from './to-session';

/** A session with the facts of its newest data version. */
export async function getSession(ctx: Ctx, input: { sessionId: string }): Promise<Session> {
  authorize(ctx, 'session.read');
  const row = await findSession(db(), ctx.actor.labId, input.sessionId);
  if (row === null) throw notFound();
  return toSession(row);
}
