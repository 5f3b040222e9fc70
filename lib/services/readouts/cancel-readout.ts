import { db } from '@/db/connection';
import { requestCancel } from '@/db/repositories/readout-claims';
import { findReadout } from '@/db/repositories/readouts';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { Readout } from '@/lib/contracts/readout';
import { AppError } from '@/lib/errors/app-error';
import { publishLive } from '@/lib/jobs/publish-live';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { toReadout } from '@/lib/services/readouts/to-readout';

/**
 * Ends a readout that waits at once, and one that runs within a second. Asking twice is the same as asking once.
 * @throws AppError conflict where it has ended already
 */
export async function cancelReadout(ctx: Ctx, input: { readoutId: string }): Promise<Readout> {
  authorize(ctx, 'readout.cancel');
  const { labId } = ctx.actor;
  const id = input.readoutId;
  const outcome = await inTransaction(async (trx) => {
    const now = await requestCancel(trx, labId, id);
    if (now?.changed)
      await writeAudit(trx, ctx, { action: 'readout.cancel', subjectKind: 'readout', subjectId: id });
    return now;
  });
  if (outcome === null) throw notFound();
  if (outcome.state === 'done' || outcome.state === 'failed')
    throw new AppError(
      'conflict',
      `This readout has ended already (${outcome.state}), so there is nothing to cancel.`,
    );
  const row = await findReadout(db(), labId, id);
  if (row === null) throw notFound();
  if (outcome.changed && row.state === 'cancelled') {
    const { sessionId } = row;
    void publishLive({
      labId,
      kind: 'readout',
      sessionId,
      readoutId: id,
      state: 'cancelled',
      progress: null,
    });
  }
  return toReadout(row);
}
