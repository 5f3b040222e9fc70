import type { Knex } from 'knex';
import type { Problem } from '@/lib/contracts/problem';
import type { Interval, Progress, ReadoutResult, ReadoutState } from '@/lib/contracts/readout';
import type { Recipe } from '@/lib/contracts/recipe';

/** A ledger line as the table holds it: the few numbers of the result that a list shows, never all of it. */
export interface ReadoutLine {
  id: string;
  number: number;
  state: ReadoutState;
  recipe: Recipe;
  progress: Progress | null;
  problems: Problem[];
  r2: number | null;
  r2Interval: Interval | null;
  nullLow: number | null;
  nullHigh: number | null;
  p: number | null;
  verdictKind: ReadoutResult['verdict']['kind'] | null;
  dataVersion: number;
  authorName: string;
  createdAt: Date;
  startedAt: Date | null;
  finishedAt: Date | null;
}

/** A session's readouts, newest first, below `beforeNumber`. */
export async function listReadoutLines(
  q: Knex,
  labId: string,
  sessionId: string,
  beforeNumber: number | null,
  limit: number,
): Promise<ReadoutLine[]> {
  const pick = (path: string, name: string) => q.raw(`json_value(r.result, ?) as ${name}`, [path]);
  const rows: Record<string, never>[] = await q('readouts as r')
    .join('users as u', 'u.id', 'r.author_id')
    .join('data_versions as d', 'd.id', 'r.data_version_id')
    .where({ 'r.session_id': sessionId, 'r.lab_id': labId })
    .modify((query) => {
      if (beforeNumber !== null) query.andWhere('r.number', '<', beforeNumber);
    })
    .orderBy('r.number', 'desc')
    .limit(limit)
    .select(
      'r.id',
      'r.number',
      'r.state',
      'r.recipe',
      'r.progress',
      'r.problems',
      'r.created_at',
      'r.started_at',
      'r.finished_at',
      'd.number as data_version',
      'u.name as author_name',
      pick('$.heldOut.r2', 'r2'),
      q.raw(`json_query(r.result, '$.heldOut.r2Interval') as r2_interval`),
      pick('$.null.quantiles.q025', 'null_low'),
      pick('$.null.quantiles.q975', 'null_high'),
      pick('$.null.p', 'p'),
      pick('$.verdict.kind', 'verdict_kind'),
    );
  return rows.map((row) => ({
    id: row.id,
    number: row.number,
    state: row.state,
    recipe: parsed(row.recipe),
    progress: parsed(row.progress),
    problems: parsed(row.problems) ?? [],
    r2: number(row.r2),
    r2Interval: parsed(row.r2_interval),
    nullLow: number(row.null_low),
    nullHigh: number(row.null_high),
    p: number(row.p),
    verdictKind: row.verdict_kind,
    dataVersion: row.data_version,
    authorName: row.author_name,
    createdAt: row.created_at,
    startedAt: row.started_at,
    finishedAt: row.finished_at,
  }));
}

function parsed<T>(value: unknown): T {
  return (typeof value === 'string' ? JSON.parse(value) : (value ?? null)) as T;
}
function number(value: unknown): number | null {
  return value === null || value === undefined ? null : Number(value);
}
