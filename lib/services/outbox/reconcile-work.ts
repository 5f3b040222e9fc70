import { db } from '@/db/connection';
import { addToOutbox } from '@/db/repositories/outbox';
import { listStaleFlows, touchFlow } from '@/db/repositories/readout-flows';
import { listWaitingWork, releaseStaleWork } from '@/db/repositories/unfinished-work';
import { inTransaction } from '@/db/transaction';
import { jobKinds } from '@/lib/jobs/definitions';
import { enqueue } from '@/lib/jobs/enqueue';
import { isFlowLive } from '@/lib/jobs/is-flow-live';
import { isJobLive } from '@/lib/jobs/is-job-live';
import { log } from '@/lib/log/log';

export interface ReconcileLimits {
  /** A claim whose heartbeat is older is lost: its worker was killed or cut off. */
  staleMs: number;
  /** A row that waits for longer must have a live job; before that the outbox is still at it. */
  waitingMs: number;
}

/**
 * Finds work that MariaDB knows of and no job carries, and sends it again: a worker was killed in the middle, or Redis
 * lost its data. Running it too often, or in several workers at once, does no harm.
 */
export async function reconcileWork({ staleMs, waitingMs }: ReconcileLimits): Promise<void> {
  // A flow whose parts wait behind other work has nobody to renew its claim; its jobs in Redis speak for it.
  for (const { id, attempt, token } of await listStaleFlows(db(), staleMs, 100))
    if (await isFlowLive(id, attempt)) await touchFlow(db(), id, token);
  for (const kind of jobKinds) {
    const released = await inTransaction(async (trx) => {
      const stale = await releaseStaleWork(trx, kind, staleMs, 100);
      for (const payload of stale) await addToOutbox(trx, { kind, payload });
      return stale;
    });
    if (released.length > 0)
      log.warn(
        { kind, ids: released.map(({ id }) => id) },
        'work without a living worker goes back to the queue',
      );
    for (const payload of await listWaitingWork(db(), kind, waitingMs, 200)) {
      if (await isJobLive(kind, payload)) continue;
      log.warn({ kind, id: payload.id }, 'work without a job is sent again');
      await enqueue(kind, payload);
    }
  }
}
