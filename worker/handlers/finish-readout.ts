import { randomBytes } from 'node:crypto';
import { db } from '@/db/connection';
import { takeFromFlow } from '@/db/repositories/readout-flows';
import { findReadoutForWorker } from '@/db/repositories/readouts';
import type { JobHandler } from '@/lib/jobs/consume';
import type { FlowPayload } from '@/lib/jobs/readout-flow';
import { finishReadoutRow } from '@/lib/services/readouts/finish-readout-row';
import type { ComputePool } from '@/worker/compute/compute-pool';
import { holdClaim } from '@/worker/hold-claim';
import { attempt } from '@/worker/readout/attempt';
import { computePatiently } from '@/worker/readout/compute-patiently';
import { prepareRequest } from '@/worker/readout/prepare-request';
import { readoutEnds } from '@/worker/readout/readout-ends';
import type { WorkerSettings } from '@/worker/settings';

/**
 * Puts the parts of a large readout together, once they are done, and writes the result. Chunks that no part has kept are
 * computed here. The chunks' order and whereabouts never change a bit of it.
 */
export function finishSpreadReadout(
  workerId: string,
  pool: ComputePool,
  settings: WorkerSettings,
): JobHandler<FlowPayload> {
  return async ({ id, token }, { stopping }) => {
    if (stopping.aborted) return;
    const own = `${workerId}-${randomBytes(4).toString('hex')}`;
    if (!(await takeFromFlow(db(), id, token, own))) return;
    const row = await findReadoutForWorker(db(), id);
    if (!row) return;
    const claim = holdClaim({ row, token: own, everyMs: settings.WORKER_HEARTBEAT_MS, stopping });
    try {
      await attempt(row, claim, async () => {
        const request = await prepareRequest(row, settings, { kind: 'all', splitAboveSeconds: null });
        const outcome = await computePatiently(request, claim, pool);
        if (outcome.kind === 'problems')
          return finishReadoutRow(row, own, readoutEnds.failed(outcome.problems));
        if (outcome.kind !== 'done') throw new Error('a readout was not put together');
        const startedAt = row.startedAt ?? new Date();
        // The time of all parts together, from the first claim on; one process has only seen the end of it.
        const computeMs = Date.now() - startedAt.getTime();
        const whole = { ...outcome, facts: { ...outcome.facts, computeMs } };
        return finishReadoutRow(row, own, readoutEnds.done(row, request, whole, startedAt));
      });
    } finally {
      claim.letGo();
    }
  };
}
