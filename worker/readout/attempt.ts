import type { ReadoutRow } from '@/db/repositories/readouts';
import { AppError } from '@/lib/errors/app-error';
import { log } from '@/lib/log/log';
import { finishReadoutRow, returnReadoutRow } from '@/lib/services/readouts/finish-readout-row';
import { ComputeLost } from '@/worker/compute/compute-pool';
import type { Claim } from '@/worker/hold-claim';
import { readoutEnds } from '@/worker/readout/readout-ends';

/**
 * Does some work on a claimed readout and deals with every way in which it can break off: cancelled and failed readouts
 * end, interrupted ones go back to the queue, and one whose claim was lost is left to whoever has it.
 */
export async function attempt(row: ReadoutRow, claim: Claim, work: () => Promise<void>): Promise<void> {
  try {
    await work();
  } catch (error) {
    switch (claim.abort.signal.aborted ? claim.abort.signal.reason : null) {
      case 'cancelled':
        return finishReadoutRow(row, claim.token, { state: 'cancelled' });
      case 'stopping':
        return returnReadoutRow(row, claim.token);
      case 'lost':
        log.warn({ readoutId: row.id }, 'the claim was lost; another worker has this readout');
        return;
    }
    const isAway = error instanceof AppError && error.code === 'unavailable';
    if (error instanceof ComputeLost || isAway) {
      log.warn({ readoutId: row.id, reason: error.message }, 'a readout was interrupted and is queued again');
      return returnReadoutRow(row, claim.token);
    }
    log.error({ err: error, readoutId: row.id }, 'a readout failed');
    return finishReadoutRow(row, claim.token, readoutEnds.internal());
  }
}
