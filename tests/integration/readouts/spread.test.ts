import { rmSync } from 'node:fs';
import { afterAll, afterEach, beforeAll, expect, it, vi } from 'vitest';
import { db } from '@/db/connection';
import type { Readout } from '@/lib/contracts/readout';
import type { RecipeInput } from '@/lib/contracts/recipe';
import { closeRedis } from '@/lib/jobs/connection';
import { closeQueues } from '@/lib/jobs/queues';
import { cancelReadout } from '@/lib/services/readouts/cancel-readout';
import { createReadout } from '@/lib/services/readouts/create-readout';
import { getReadout } from '@/lib/services/readouts/get-readout';
import { ctxOf } from '@/tests/integration/readouts/ctx-of';
import { makeData, makeSession, type MadeSession } from '@/tests/integration/readouts/made-session';
import { until } from '@/tests/integration/readouts/until';
import { buildWorker, startWorker, type WorkerProcess } from '@/tests/integration/readouts/worker-process';
import { control } from '@/tests/support/control';
import { freshDatabase } from '@/tests/support/services';

/* A large readout spread over several workers gives the bits that one worker gives, whatever happens to some of them. */
/** Seconds on a machine that has nothing else to do; the limit is for one that has. */
vi.setConfig({ testTimeout: 240_000, hookTimeout: 240_000 });

let dropDatabase: () => Promise<void>;
let folder: string;
let made: MadeSession;
let whole: Readout;
let workers: WorkerProcess[] = [];
const ctx = () => ctxOf(made.lab);
const recipe: RecipeInput = {
  label: 'fraction',
  seed: 3,
  folds: { kind: 'stratified', k: 10, repeats: 2 },
  null: { kind: 'free', draws: 1_000 },
};
const alwaysSplit = { WORKER_SPLIT_SECONDS: '0', LOG_LEVEL: 'info' };

function work(env: Record<string, string>): WorkerProcess {
  const worker = startWorker(folder, env);
  workers.push(worker);
  return worker;
}
const start = () => createReadout(ctx(), { sessionId: made.sessionId, recipe });
const look = (id: string) => getReadout(ctx(), { readoutId: id });
const partsOf = (worker: WorkerProcess, id: string) =>
  worker
    .output()
    .split('\n')
    .filter((line) => line.includes('a part of a readout is done') && line.includes(id)).length;
const atRest = (id: string): Promise<Readout> =>
  until(
    `the end of readout ${id}`,
    async () => {
      const readout = await look(id);
      return readout.state === 'queued' || readout.state === 'running' ? null : readout;
    },
    120_000,
  );
const inTheFlow = (id: string) =>
  until('the middle of the flow', async () => {
    if ((await look(id)).state === 'done') throw new Error('it was over before it could be disturbed');
    const parts = await db()('readout_parts').where({ readout_id: id });
    const row = await db()('readouts').where({ id }).first();
    return parts.length > 0 && String(row.claimed_by).startsWith('flow-');
  });
async function expectSame(id: string): Promise<Readout> {
  const readout = await atRest(id);
  expect(readout.problems).toEqual([]);
  expect(readout.state).toBe('done');
  expect(readout.result).toEqual(whole.result);
  const ends = await db()('audit_entries').where({ subject_id: id }).whereNot({ action: 'readout.create' });
  expect(ends.map(({ action }) => action)).toEqual(['readout.done']);
  expect(await db()('readout_parts').where({ readout_id: id })).toEqual([]);
  return readout;
}

beforeAll(async () => {
  dropDatabase = await freshDatabase();
  await control('redis', 'lose');
  folder = await buildWorker();
  made = await makeSession(makeData({ nTrials: 300, nUnits: 40, nBins: 4 }));
  const worker = work({ WORKER_SPLIT_SECONDS: '3600' });
  whole = await atRest((await start()).id);
  expect(whole.state).toBe('done');
  await worker.stop();
});
afterEach(async () => {
  await Promise.all(workers.map((worker) => worker.stop()));
  workers = [];
});
afterAll(async () => {
  await Promise.all(workers.map((worker) => worker.kill()));
  await closeQueues();
  closeRedis();
  await dropDatabase?.();
  if (folder) rmSync(folder, { recursive: true, force: true });
});

it('two workers give the bits of one', async () => {
  const [first, second] = [work(alwaysSplit), work(alwaysSplit)];
  await until('both workers', async () =>
    [first, second].every((one) => one.output().includes('the worker is up')),
  );
  const { id } = await start();
  const readout = await expectSame(id);
  expect(readout.provenance!.attempts).toBe(1);
  const done = [partsOf(first, id), partsOf(second, id)];
  expect(done[0] + done[1]).toBe(4);
  expect(Math.min(...done)).toBeGreaterThan(0);
});

it('one of two workers is killed in the middle of its part', async () => {
  const [first] = [work(alwaysSplit), work(alwaysSplit)];
  const { id } = await start();
  await inTheFlow(id);
  await first.kill();
  await expectSame(id);
});

it('Redis loses the flow', async () => {
  work(alwaysSplit);
  const { id } = await start();
  await inTheFlow(id);
  await control('redis', 'lose');
  const readout = await expectSame(id);
  expect(readout.provenance!.attempts).toBe(2);
});

it('is cancelled at once, also when no worker is at it', async () => {
  const worker = work(alwaysSplit);
  const { id } = await start();
  await inTheFlow(id);
  await worker.kill();
  expect((await look(id)).state).toBe('running');
  expect((await cancelReadout(ctx(), { readoutId: id })).state).toBe('cancelled');
  const other = work(alwaysSplit);
  const next = await start();
  await expectSame(next.id);
  expect((await look(id)).state).toBe('cancelled');
  expect(partsOf(other, id)).toBe(0);
  expect(await db()('readout_parts').where({ readout_id: id })).toEqual([]);
});
