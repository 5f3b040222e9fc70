import { db } from '@/db/connection';
import { listExclusionRows } from '@/db/repositories/exclusions';
import { findSession } from '@/db/repositories/recording-sessions';
import type { ExclusionList } from '@/lib/contracts/session';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { toExclusionList } from './to-exclusion-list';

/** A session's exclusions as they are now, or as they were at an earlier version. */
export async function listExclusions(
  ctx: Ctx,
  input: { sessionId: string; version?: number },
): Promise<ExclusionList> {
  authorize(ctx, 'exclusion.read');
  if ((await findSession(db(), ctx.actor.labId, input.sessionId)) === null) throw notFound();
  const rows = await listExclusionRows(db(), ctx.actor.labId, input.sessionId, input.version ?? null);
  return toExclusionList(rows);
}
