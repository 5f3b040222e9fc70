import type { Knex } from 'knex';
import type { Intake } from '@/lib/contracts/intake';
import type { Problem } from '@/lib/contracts/problem';
import type { SessionState } from '@/lib/contracts/session';

export type IntakeState = 'queued' | 'running' | 'waiting' | 'done' | 'refused' | 'failed';
export interface IntakeRow {
  id: string;
  lab_id: string;
  session_id: string;
  mapping: Intake;
  state: IntakeState;
  problems: Problem[];
  attempts: number;
  claimed_by: string | null;
  created_by: string;
  created_at: Date;
}

const now = (q: Knex): Knex.Raw => q.raw('current_timestamp(3)');

export async function insertIntake(
  trx: Knex,
  row: Pick<IntakeRow, 'id' | 'lab_id' | 'session_id' | 'mapping' | 'created_by'>,
): Promise<void> {
  await trx('intakes').insert({ ...row, mapping: JSON.stringify(row.mapping), problems: '[]' });
}

export async function findIntakeForWorker(q: Knex, id: string): Promise<IntakeRow | null> {
  return ((await q('intakes').where({ id }).first()) as IntakeRow | undefined) ?? null;
}

export async function hasOpenIntake(q: Knex, sessionId: string): Promise<boolean> {
  const row = await q('intakes')
    .where({ session_id: sessionId })
    .whereIn('state', ['queued', 'running'])
    .first('id');
  return row !== undefined;
}

/** Whether a mapping of the session that is open or was carried out reads from the file. */
export async function isFileMapped(q: Knex, sessionId: string, fileId: string): Promise<boolean> {
  const row = await q('intakes')
    .where({ session_id: sessionId })
    .whereIn('state', ['queued', 'running', 'waiting', 'done'])
    .andWhere('mapping', 'like', `%${fileId}%`)
    .first('id');
  return row !== undefined;
}

/** Claims a queued intake by compare-and-set; false where somebody else has it or it is at rest. */
export async function claimIntake(q: Knex, id: string, claim: string): Promise<boolean> {
  const changed = await q('intakes')
    .where({ id, state: 'queued' })
    .update({ state: 'running', attempts: q.raw('attempts + 1'), claimed_by: claim, heartbeat_at: now(q) });
  return changed === 1;
}

/** Renews a claim; false once it is lost. */
export async function beatIntake(q: Knex, id: string, claim: string): Promise<boolean> {
  await q('intakes')
    .where({ id, state: 'running', claimed_by: claim })
    .update({ heartbeat_at: now(q) });
  const row = await q('intakes').where({ id, state: 'running', claimed_by: claim }).first('id');
  return row !== undefined;
}

/** Locks a claimed intake for its last change; false when the claim is lost. */
export async function lockIntakeClaim(trx: Knex.Transaction, id: string, claim: string): Promise<boolean> {
  const row = await trx('intakes').where({ id, state: 'running', claimed_by: claim }).forUpdate().first('id');
  return row !== undefined;
}

export async function endIntake(
  trx: Knex,
  id: string,
  end: { state: 'waiting' | 'done' | 'refused' | 'failed'; problems: Problem[] },
): Promise<void> {
  await trx('intakes')
    .where({ id })
    .update({
      state: end.state,
      problems: JSON.stringify(end.problems),
      claimed_by: null,
      heartbeat_at: null,
    });
}

/** Gives a claimed intake back to the queue; false when the claim was lost. */
export async function releaseIntake(trx: Knex, id: string, claim: string): Promise<boolean> {
  const changed = await trx('intakes')
    .where({ id, state: 'running', claimed_by: claim })
    .update({ state: 'queued', claimed_by: null, heartbeat_at: null });
  return changed === 1;
}

/** Sets where the session stands after a step of its intake, with what the step found. */
export async function setSessionState(
  trx: Knex,
  sessionId: string,
  state: SessionState,
  problems: Problem[],
): Promise<void> {
  await trx('recording_sessions')
    .where({ id: sessionId })
    .update({ state, problems: JSON.stringify(problems), version: trx.raw('version + 1') });
}
