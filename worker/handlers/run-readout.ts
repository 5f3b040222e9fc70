import { randomBytes } from 'node:crypto';
import { db } from '@/db/connection';
import { claimReadout } from '@/db/repositories/readout-claims';
import { flowClaimPrefix, handToFlow } from '@/db/repositories/readout-flows';
import { findReadoutForWorker, type ReadoutRow } from '@/db/repositories/readouts';
import type { JobHandler } from '@/lib/jobs/consume';
import { addReadoutFlow } from '@/lib/jobs/readout-flow';
import { finishReadoutRow } from '@/lib/services/readouts/finish-readout-row';
import type { ComputePool } from '@/worker/compute/compute-pool';
import { holdClaim, type Claim } from '@/worker/hold-claim';
import { attempt } from '@/worker/readout/attempt';
import { computePatiently } from '@/worker/readout/compute-patiently';
import { prepareRequest } from '@/worker/readout/prepare-request';
import { readoutEnds } from '@/worker/readout/readout-ends';
import type { WorkerSettings } from '@/worker/settings';

/** An interrupted readout is begun again this often before it counts as failed. */
const maxAttempts = 8;

/**
 * Carries a readout out: claims its row, has it computed in a process of its own, writes what came of it. A large one is
 * spread over all workers instead. A second delivery of the same job finds no row to claim and changes nothing.
 */
export function runReadout(workerId: string, pool: ComputePool, settings: WorkerSettings): JobHandler {
  return async ({ id }, { stopping }) => {
    if (stopping.aborted) return;
    const token = `${workerId}-${randomBytes(4).toString('hex')}`;
    if (!(await claimReadout(db(), id, token))) return;
    const row = await findReadoutForWorker(db(), id);
    if (!row) return;
    const claim = holdClaim({ row, token, everyMs: settings.WORKER_HEARTBEAT_MS, stopping });
    try {
      await attempt(row, claim, () => carryOut(row, claim, pool, settings));
    } finally {
      claim.letGo();
    }
  };
}

async function carryOut(
  row: ReadoutRow,
  claim: Claim,
  pool: ComputePool,
  settings: WorkerSettings,
): Promise<void> {
  const startedAt = new Date();
  if (row.cancelRequested) return finishReadoutRow(row, claim.token, { state: 'cancelled' });
  if (row.attempts > maxAttempts)
    return finishReadoutRow(row, claim.token, readoutEnds.interrupted(row.attempts - 1));
  const request = await prepareRequest(row, settings, {
    kind: 'all',
    splitAboveSeconds: settings.WORKER_SPLIT_SECONDS,
  });
  const outcome = await computePatiently(request, claim, pool);
  switch (outcome.kind) {
    case 'problems':
      return finishReadoutRow(row, claim.token, readoutEnds.failed(outcome.problems));
    case 'split':
      return spread(row, claim, outcome.parts);
    case 'done':
      return finishReadoutRow(row, claim.token, readoutEnds.done(row, request, outcome, startedAt));
    case 'partDone':
      throw new Error('a part was computed where all was asked for');
  }
}

/** Hands the readout to a flow of jobs. Should this process end in between, the claim grows stale and all begins again. */
async function spread(row: ReadoutRow, claim: Claim, parts: number): Promise<void> {
  const token = `${flowClaimPrefix}${row.attempts}-${randomBytes(4).toString('hex')}`;
  claim.letGo();
  if (!(await handToFlow(db(), row.id, claim.token, token))) return;
  await addReadoutFlow({ id: row.id, attempt: row.attempts, token, parts });
}
