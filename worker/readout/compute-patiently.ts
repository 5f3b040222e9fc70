import { db } from '@/db/connection';
import { saveReadoutPart } from '@/db/repositories/readout-parts';
import { log } from '@/lib/log/log';
import type { ComputeHooks, ComputeOutcome, ComputePool } from '@/worker/compute/compute-pool';
import type { ComputeRequest } from '@/worker/compute/messages';
import type { Claim } from '@/worker/hold-claim';
import { pause } from '@/worker/pause';
import { partPrefix } from '@/worker/readout/prepare-request';

/** Computes with a claim held; while the object store is away, waits and begins again. Finished chunks are kept. */
export async function computePatiently(
  request: ComputeRequest,
  claim: Claim,
  pool: ComputePool,
  hooks: Pick<ComputeHooks, 'onProgress' | 'onPlanned'> = { onProgress: claim.report },
): Promise<ComputeOutcome> {
  const onPart = (chunk: number, payload: Uint8Array) =>
    saveReadoutPart(db(), request.readoutId, `${partPrefix}${chunk}`, payload).catch((error: unknown) =>
      log.debug({ err: error }, 'a finished part was not kept'),
    );
  for (;;) {
    try {
      return await pool.run(request, { ...hooks, onPart }, claim.abort.signal);
    } catch (error) {
      if (claim.abort.signal.aborted || (error as { code?: unknown }).code !== 'unavailable') throw error;
      claim.report({ done: 0, total: 1_000, phase: 'Waiting for the object store', secondsLeft: null });
      await pause(2_000, claim.abort.signal);
    }
  }
}
