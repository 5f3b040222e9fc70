import { db } from '@/db/connection';
import { listSessionRows } from '@/db/repositories/recording-sessions';
import { findStudy } from '@/db/repositories/studies';
import type { Session } from '@/lib/contracts/session';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import type { PageInput } from '@/lib/services/page-input';
import { pageOfRows } from '@/lib/services/page-of-rows';
import { toSession } from './to-session';

/** A study's sessions, or all of the lab's, newest first. */
export async function listSessions(
  ctx: Ctx,
  input: PageInput & { studyId?: string },
): Promise<{ items: Session[]; nextCursor: string | null }> {
  authorize(ctx, 'session.read');
  const studyId = input.studyId ?? null;
  if (studyId !== null && (await findStudy(db(), ctx.actor.labId, studyId)) === null) throw notFound();
  return pageOfRows(
    input,
    (beforeId, limit) => listSessionRows(db(), ctx.actor.labId, studyId, beforeId, limit),
    toSession,
  );
}
