import type { Knex } from 'knex';
import type { Problem } from '@/lib/contracts/problem';
import type { Progress, Provenance, ReadoutResult, ReadoutState } from '@/lib/contracts/readout';
import type { Recipe } from '@/lib/contracts/recipe';

export interface ReadoutRow {
  id: string;
  labId: string;
  sessionId: string;
  dataVersionId: string;
  number: number;
  recipe: Recipe;
  recipeHash: string;
  inputsKey: string | null;
  state: ReadoutState;
  progress: Progress | null;
  cancelRequested: boolean;
  attempts: number;
  claimedBy: string | null;
  result: ReadoutResult | null;
  provenance: Provenance | null;
  predictionsKey: string | null;
  problems: Problem[];
  authorId: string;
  authorName: string;
  createdAt: Date;
  startedAt: Date | null;
  finishedAt: Date | null;
}
export type NewReadout = Pick<
  ReadoutRow,
  | 'id'
  | 'labId'
  | 'sessionId'
  | 'dataVersionId'
  | 'number'
  | 'recipe'
  | 'recipeHash'
  | 'inputsKey'
  | 'authorId'
>;

/**
 * Takes the session's next readout number. The session's row stays locked until the transaction ends, so that numbers
 * are given once and without gaps.
 */
export async function takeReadoutNumber(
  trx: Knex.Transaction,
  labId: string,
  sessionId: string,
): Promise<number> {
  const session = await trx('recording_sessions')
    .select('readout_count')
    .where({ id: sessionId, lab_id: labId })
    .forUpdate()
    .first();
  if (!session) throw new Error(`session ${sessionId} is gone`);
  const number = session.readout_count + 1;
  await trx('recording_sessions').where({ id: sessionId, lab_id: labId }).update({ readout_count: number });
  return number;
}

export async function insertReadout(trx: Knex.Transaction, readout: NewReadout): Promise<void> {
  await trx('readouts').insert({
    id: readout.id,
    lab_id: readout.labId,
    session_id: readout.sessionId,
    data_version_id: readout.dataVersionId,
    number: readout.number,
    recipe: JSON.stringify(readout.recipe),
    recipe_hash: readout.recipeHash,
    inputs_key: readout.inputsKey,
    state: 'queued',
    problems: '[]',
    author_id: readout.authorId,
  });
}

/** One readout of the lab with everything about it, or null. */
export async function findReadout(q: Knex, labId: string, id: string): Promise<ReadoutRow | null> {
  const row = await withAuthor(q).where({ 'readouts.id': id, 'readouts.lab_id': labId }).first();
  return row ? toReadout(row) : null;
}

/** One readout by its id alone: for the worker, which acts for whichever lab the row names. */
export async function findReadoutForWorker(q: Knex, id: string): Promise<ReadoutRow | null> {
  const row = await withAuthor(q).where({ 'readouts.id': id }).first();
  return row ? toReadout(row) : null;
}

/** States of a session's readouts that are not at rest, and of those that came to rest within the last minute. */
export async function listReadoutStates(
  q: Knex,
  labId: string,
  sessionId: string,
): Promise<{ id: string; state: ReadoutState; progress: Progress | null }[]> {
  const rows = await q('readouts')
    .select('id', 'state', 'progress')
    .where({ session_id: sessionId, lab_id: labId })
    .andWhere((where) =>
      where
        .whereIn('state', ['queued', 'running'])
        .orWhere('finished_at', '>', q.raw('timestampadd(minute, -1, current_timestamp(3))')),
    )
    .orderBy('number');
  return rows.map((row) => ({ id: row.id, state: row.state, progress: fromJson<Progress>(row.progress) }));
}

function withAuthor(q: Knex) {
  return q('readouts')
    .join('users', 'users.id', 'readouts.author_id')
    .select('readouts.*', 'users.name as author_name');
}

/** JSON columns come back parsed from the driver where the server marks them as JSON, else as text. */
function fromJson<T>(value: unknown): T | null {
  if (value === null || value === undefined) return null;
  return (typeof value === 'string' ? JSON.parse(value) : value) as T;
}

type Columns = Record<string, unknown> & {
  created_at: Date;
  started_at: Date | null;
  finished_at: Date | null;
};

function toReadout(row: Columns): ReadoutRow {
  const text = (column: string) => row[column] as string;
  return {
    id: text('id'),
    labId: text('lab_id'),
    sessionId: text('session_id'),
    dataVersionId: text('data_version_id'),
    number: row.number as number,
    recipe: fromJson<Recipe>(row.recipe)!,
    recipeHash: text('recipe_hash'),
    inputsKey: row.inputs_key as string | null,
    state: row.state as ReadoutState,
    progress: fromJson<Progress>(row.progress),
    cancelRequested: Boolean(row.cancel_requested),
    attempts: row.attempts as number,
    claimedBy: row.claimed_by as string | null,
    result: fromJson<ReadoutResult>(row.result),
    provenance: fromJson<Provenance>(row.provenance),
    predictionsKey: row.predictions_key as string | null,
    problems: fromJson<Problem[]>(row.problems) ?? [],
    authorId: text('author_id'),
    authorName: text('author_name'),
    createdAt: row.created_at,
    startedAt: row.started_at,
    finishedAt: row.finished_at,
  };
}
