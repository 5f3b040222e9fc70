import { insertExclusion, listExclusionRows } from '@/db/repositories/exclusions';
import { findSession, lockSession } from '@/db/repositories/recording-sessions';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { CreateExclusion, ExclusionList } from '@/lib/contracts/session';
import { AppError } from '@/lib/errors/app-error';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { exclusionFaults } from './exclusion-faults';
import { toExclusionList } from './to-exclusion-list';

/**
 * Leaves trials or units out, or puts them back, with a reason. Entries are only ever added: the version is their
 * number, and a readout names the version that it used.
 */
export async function createExclusion(
  ctx: Ctx,
  input: { sessionId: string; exclusion: CreateExclusion },
): Promise<ExclusionList> {
  authorize(ctx, 'exclusion.create');
  const { labId, userId, userName } = ctx.actor;
  const { action, trials, units, reason } = input.exclusion;
  const kind = trials === undefined ? 'unit' : 'trial';
  const indices = trials ?? units ?? [];
  return inTransaction(async (trx) => {
    // The lock puts writers in a row, so that versions have no gaps and no doubles.
    if (!(await lockSession(trx, labId, input.sessionId))) throw notFound();
    const session = await findSession(trx, labId, input.sessionId);
    const count = kind === 'trial' ? session?.n_trials : session?.n_units;
    if (count === null || count === undefined)
      throw new AppError('conflict', 'The session has no data yet, so there is nothing to leave out.');
    const earlier = await listExclusionRows(trx, labId, input.sessionId);
    const now = toExclusionList(earlier);
    const leftOut = kind === 'trial' ? now.excludedTrials : now.excludedUnits;
    const faults = exclusionFaults({ action, kind, indices, count, leftOut });
    if (faults.length > 0) throw new AppError('invalid-input', `Not valid: ${faults[0].detail}.`, { faults });
    const row = {
      session_id: input.sessionId,
      version: now.version + 1,
      lab_id: labId,
      action,
      kind,
      indices: [...new Set(indices)].sort((a, b) => a - b),
      reason,
      author_id: userId,
      created_at: new Date(),
    } as const;
    await insertExclusion(trx, row);
    await writeAudit(trx, ctx, {
      action: 'exclusion.create',
      subjectKind: 'session',
      subjectId: input.sessionId,
      detail: { version: row.version, action, kind, count: row.indices.length, reason },
    });
    return toExclusionList([...earlier, { ...row, author_name: userName }]);
  });
}
