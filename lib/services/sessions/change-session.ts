import { findSession, updateSession } from '@/db/repositories/recording-sessions';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { ChangeSession, Session } from '@/lib/contracts/session';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { requireDateInRange } from '@/lib/services/require-date-in-range';
import { staleVersion } from '@/lib/services/stale-version';
import { toSession } from './to-session';

/** Changes a session's name or start, if it is still at the version that the member saw. */
export async function changeSession(
  ctx: Ctx,
  input: { sessionId: string; ifVersion: number; change: ChangeSession },
): Promise<Session> {
  authorize(ctx, 'session.change');
  const { name, startedAt } = input.change;
  const change = {
    ...(name === undefined ? {} : { name }),
    ...(startedAt === undefined ? {} : { started_at: requireDateInRange(startedAt, '/startedAt') }),
  };
  return inTransaction(async (trx) => {
    const before = await findSession(trx, ctx.actor.labId, input.sessionId);
    if (before === null) throw notFound();
    if (!(await updateSession(trx, ctx.actor.labId, before.id, input.ifVersion, change)))
      throw staleVersion();
    await writeAudit(trx, ctx, {
      action: 'session.change',
      subjectKind: 'session',
      subjectId: before.id,
      detail: {
        before: { name: before.name, startedAt: before.started_at.toISOString() },
        change: input.change,
      },
    });
    return toSession({ ...before, ...change, version: input.ifVersion + 1 });
  });
}
