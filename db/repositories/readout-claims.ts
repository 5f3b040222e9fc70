import type { Knex } from 'knex';
import { flowClaimPrefix } from '@/db/repositories/readout-flows';
import { removeReadoutParts } from '@/db/repositories/readout-parts';
import type { Problem } from '@/lib/contracts/problem';
import type { Progress, Provenance, ReadoutResult } from '@/lib/contracts/readout';

const now = (q: Knex) => q.raw('current_timestamp(3)');

/**
 * Claims a queued readout for one worker by compare-and-set. False when somebody else has it, or it is at rest: then
 * the job that led here is a second delivery and there is nothing to do.
 */
export async function claimReadout(q: Knex, id: string, claim: string): Promise<boolean> {
  const changed = await q('readouts')
    .where({ id, state: 'queued' })
    .update({
      state: 'running',
      attempts: q.raw('attempts + 1'),
      claimed_by: claim,
      heartbeat_at: now(q),
      started_at: q.raw('coalesce(started_at, current_timestamp(3))'),
    });
  return changed === 1;
}

/**
 * Renews the claim and writes the progress. `held` is false once the claim is lost (the row was given to another
 * worker, or came to rest); `cancel` is true when a member asked for an end.
 */
export async function beatReadout(
  q: Knex,
  id: string,
  claim: string,
  progress: Progress | null,
): Promise<{ held: boolean; cancel: boolean }> {
  // heartbeat_at always changes, so that "rows changed" and "rows found" are the same number.
  await q('readouts')
    .where({ id, state: 'running', claimed_by: claim })
    .update({
      heartbeat_at: now(q),
      ...(progress ? { progress: JSON.stringify(progress) } : {}),
    });
  const row = await q('readouts').select('state', 'claimed_by', 'cancel_requested').where({ id }).first();
  const held = row !== undefined && row.state === 'running' && row.claimed_by === claim;
  return { held, cancel: Boolean(row?.cancel_requested) };
}

/** Locks the row for its last change. False when the claim is lost. */
export async function lockClaim(trx: Knex.Transaction, id: string, claim: string): Promise<boolean> {
  const row = await trx('readouts')
    .select('id')
    .where({ id, state: 'running', claimed_by: claim })
    .forUpdate()
    .first();
  return row !== undefined;
}

/** What a claimed readout comes to. */
export type ReadoutEnd =
  | { state: 'done'; result: ReadoutResult; provenance: Provenance; predictionsKey: string }
  | { state: 'failed'; problems: Problem[]; provenance: Provenance | null }
  | { state: 'cancelled' };

/** Writes the end of a readout whose row `lockClaim` has locked. */
export async function endReadout(trx: Knex.Transaction, id: string, end: ReadoutEnd): Promise<void> {
  await trx('readouts')
    .where({ id })
    .update({
      state: end.state,
      claimed_by: null,
      heartbeat_at: null,
      finished_at: now(trx),
      ...(end.state === 'done'
        ? {
            result: JSON.stringify(end.result),
            provenance: JSON.stringify(end.provenance),
            predictions_key: end.predictionsKey,
            progress: null,
          }
        : {}),
      ...(end.state === 'failed'
        ? {
            problems: JSON.stringify(end.problems),
            provenance: end.provenance ? JSON.stringify(end.provenance) : null,
          }
        : {}),
    });
}

/** Gives a claimed readout back to the queue, for another worker. False when the claim was lost already. */
export async function releaseReadout(trx: Knex.Transaction, id: string, claim: string): Promise<boolean> {
  const changed = await trx('readouts')
    .where({ id, state: 'running', claimed_by: claim })
    .update({ state: 'queued', claimed_by: null, heartbeat_at: null });
  return changed === 1;
}

/**
 * Asks for an end. A readout that waits, or is spread over jobs, is cancelled at once; one that a worker runs is marked,
 * and that worker ends it.
 * @returns the state that the row has now, or null when there is no such readout in the lab
 */
export async function requestCancel(
  trx: Knex.Transaction,
  labId: string,
  id: string,
): Promise<{ state: string; changed: boolean } | null> {
  const row = await trx('readouts')
    .select('state', 'cancel_requested', 'claimed_by')
    .where({ id, lab_id: labId })
    .forUpdate()
    .first();
  if (!row) return null;
  const isInFlow = row.state === 'running' && String(row.claimed_by).startsWith(flowClaimPrefix);
  if (row.state === 'queued' || isInFlow) {
    // In a flow perhaps no worker is at it just now; those that are lose the claim and stop.
    await trx('readouts')
      .where({ id })
      .update({
        state: 'cancelled',
        cancel_requested: true,
        claimed_by: null,
        heartbeat_at: null,
        finished_at: now(trx),
      });
    await removeReadoutParts(trx, id);
    return { state: 'cancelled', changed: true };
  }
  if (row.state !== 'running' || row.cancel_requested) return { state: row.state, changed: false };
  await trx('readouts').where({ id }).update({ cancel_requested: true });
  return { state: 'running', changed: true };
}
