import type { Knex } from 'knex';
import type { Progress } from '@/lib/contracts/readout';

/** Claims of flows begin with this: the row is held by jobs in Redis, not by one worker. */
export const flowClaimPrefix = 'flow-';

/** Hands a claimed readout to a flow. False when the claim was lost. */
export async function handToFlow(q: Knex, id: string, claim: string, token: string): Promise<boolean> {
  const changed = await q('readouts')
    .where({ id, state: 'running', claimed_by: claim })
    .update({ claimed_by: token, heartbeat_at: q.raw('current_timestamp(3)') });
  return changed === 1;
}

/** Takes a readout over from its flow, to put it together. False when the flow is not the row's any more. */
export async function takeFromFlow(q: Knex, id: string, token: string, claim: string): Promise<boolean> {
  return handToFlow(q, id, token, claim);
}

/** Readouts in the hands of flows whose heartbeat is older than `staleMs`. */
export async function listStaleFlows(
  q: Knex,
  staleMs: number,
  limit: number,
): Promise<{ id: string; attempt: number; token: string }[]> {
  const rows = await q('readouts')
    .select('id', 'attempts', 'claimed_by')
    .where({ state: 'running' })
    .andWhere('claimed_by', 'like', `${flowClaimPrefix}%`)
    .andWhere(
      'heartbeat_at',
      '<',
      q.raw('timestampadd(microsecond, ?, current_timestamp(3))', [-staleMs * 1_000]),
    )
    .limit(limit);
  return rows.map((row) => ({ id: row.id, attempt: row.attempts, token: row.claimed_by }));
}

/** Renews a flow's claim, with its progress if there is any to tell. */
export async function touchFlow(
  q: Knex,
  id: string,
  token: string,
  progress: Progress | null = null,
): Promise<void> {
  await q('readouts')
    .where({ id, state: 'running', claimed_by: token })
    .update({
      heartbeat_at: q.raw('current_timestamp(3)'),
      ...(progress ? { progress: JSON.stringify(progress) } : {}),
    });
}

/** How many pieces of a readout are kept under names that begin with `prefix`. */
export async function countReadoutParts(q: Knex, readoutId: string, prefix: string): Promise<number> {
  const row = await q('readout_parts')
    .where({ readout_id: readoutId })
    .andWhere('part', 'like', `${prefix}%`)
    .count('* as n')
    .first();
  return Number(row?.n ?? 0);
}
