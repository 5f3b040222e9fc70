import { db } from '@/db/connection';
import { countReadoutParts } from '@/db/repositories/readout-flows';
import { findReadoutForWorker, type ReadoutRow } from '@/db/repositories/readouts';
import type { JobHandler } from '@/lib/jobs/consume';
import type { PartPayload } from '@/lib/jobs/readout-flow';
import { log } from '@/lib/log/log';
import { finishReadoutRow } from '@/lib/services/readouts/finish-readout-row';
import type { ComputePool } from '@/worker/compute/compute-pool';
import { holdClaim, type Claim } from '@/worker/hold-claim';
import { computePatiently } from '@/worker/readout/compute-patiently';
import { partPrefix, prepareRequest } from '@/worker/readout/prepare-request';
import { readoutEnds } from '@/worker/readout/readout-ends';
import type { WorkerSettings } from '@/worker/settings';

/** How often a part says how far all parts together are. */
const tellEveryMs = 1_000;

/**
 * Computes one part of a large readout and keeps its chunks' outputs. Any worker may do it, twice does no harm, and a
 * part that is never done is made up for by the job that puts all of them together.
 */
export function runReadoutPart(pool: ComputePool, settings: WorkerSettings): JobHandler<PartPayload> {
  return async ({ id, token, part, parts }, { stopping }) => {
    stopping.throwIfAborted(); // the job goes back and another worker takes it
    const row = await findReadoutForWorker(db(), id);
    if (row?.state !== 'running' || row.claimedBy !== token) return; // of an older flow, or ended meanwhile
    const claim = holdClaim({ row, token, everyMs: settings.WORKER_HEARTBEAT_MS, stopping });
    try {
      const request = await prepareRequest(row, settings, { kind: 'part', part, parts });
      const outcome = await computePatiently(request, claim, pool, tellTogether(row, claim));
      if (outcome.kind === 'problems')
        return await finishReadoutRow(row, token, readoutEnds.failed(outcome.problems));
      log.info({ readoutId: id, part, parts }, 'a part of a readout is done');
    } catch (error) {
      const { aborted, reason } = claim.abort.signal;
      if (aborted && reason === 'lost') return;
      if (aborted && reason === 'cancelled')
        return await finishReadoutRow(row, token, { state: 'cancelled' });
      throw error; // the job is tried again, here or elsewhere
    } finally {
      claim.letGo();
    }
  };
}

/** Progress of all parts together: chunks that are kept, of all chunks. */
function tellTogether(row: ReadoutRow, claim: Claim) {
  let chunks = 0;
  let toldAt = 0;
  return {
    onPlanned: (all: number) => void (chunks = all),
    onProgress: ({ phase }: { phase: string }) => {
      if (chunks === 0 || Date.now() - toldAt < tellEveryMs) return;
      toldAt = Date.now();
      countReadoutParts(db(), row.id, partPrefix).then(
        (done) => {
          const seconds = (Date.now() - (row.startedAt?.getTime() ?? Date.now())) / 1_000;
          const secondsLeft = done > 0 ? (seconds * (chunks - done)) / done : null;
          claim.report({ done, total: chunks, phase, secondsLeft });
        },
        (error: unknown) => log.debug({ err: error }, 'progress could not be told'),
      );
    },
  };
}
