import { rmSync } from 'node:fs';
import { afterAll, afterEach, beforeAll, expect, it, vi } from 'vitest';
import { db } from '@/db/connection';
import type { Readout } from '@/lib/contracts/readout';
import type { RecipeInput } from '@/lib/contracts/recipe';
import { closeRedis } from '@/lib/jobs/connection';
import { closeQueues } from '@/lib/jobs/queues';
import { createReadout } from '@/lib/services/readouts/create-readout';
import { getReadout } from '@/lib/services/readouts/get-readout';
import { control } from '@/tests/support/control';
import { freshDatabase } from '@/tests/support/services';
import { ctxOf } from '@/tests/integration/readouts/ctx-of';
import { makeData, makeSession, type MadeSession } from '@/tests/integration/readouts/made-session';
import { until } from '@/tests/integration/readouts/until';
import { buildWorker, startWorker, type WorkerProcess } from '@/tests/integration/readouts/worker-process';

/*
 * What must not lose or double a readout: a worker killed in the middle, a Redis that lost its data, a MariaDB that was
 * restarted, a store that was away. Each time the readout ends once, with the numbers that an undisturbed one has.
 */
/** Seconds on a machine that has nothing else to do; the limit is for one that has. */
vi.setConfig({ testTimeout: 240_000, hookTimeout: 240_000 });

let dropDatabase: () => Promise<void>;
let folder: string;
let made: MadeSession;
let undisturbed: Readout;
let workers: WorkerProcess[] = [];
const ctx = () => ctxOf(made.lab);
/** Takes about a second of computing: long enough to be disturbed. */
const recipe: RecipeInput = {
  label: 'fraction',
  seed: 3,
  folds: { kind: 'stratified', k: 10, repeats: 2 },
  null: { kind: 'free', draws: 1_000 },
};
const keepAll = { WORKER_KEEP_PARTS_SECONDS: '0' };

function work(env: Record<string, string> = {}): WorkerProcess {
  const worker = startWorker(folder, env);
  workers.push(worker);
  return worker;
}
const start = () => createReadout(ctx(), { sessionId: made.sessionId, recipe });
const look = (id: string) => getReadout(ctx(), { readoutId: id });
const inTheMiddle = (id: string) =>
  until('the middle of the readout', async () => {
    const { state, progress } = await look(id);
    if (state === 'done') throw new Error('the readout was over before it could be disturbed');
    return state === 'running' && progress !== null && progress.done > 0;
  });
const atRest = (id: string): Promise<Readout> =>
  until(
    `the end of readout ${id}`,
    async () => {
      const readout = await look(id);
      return readout.state === 'queued' || readout.state === 'running' ? null : readout;
    },
    120_000,
  );
/** Ended once, with the numbers of the undisturbed one. */
async function expectSame(id: string): Promise<Readout> {
  const readout = await atRest(id);
  expect(readout.problems).toEqual([]);
  expect(readout.state).toBe('done');
  expect(readout.result).toEqual(undisturbed.result);
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
  const worker = work();
  undisturbed = await atRest((await start()).id);
  expect(undisturbed.state).toBe('done');
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

it('a worker killed in the middle: another goes on from the parts that were kept', async () => {
  const first = work(keepAll);
  const { id } = await start();
  await inTheMiddle(id);
  await until(
    'a part that was kept',
    async () => (await db()('readout_parts').where({ readout_id: id })).length > 0,
  );
  await first.kill();
  expect((await look(id)).state).toBe('running'); // nobody could say so
  work(keepAll);
  const readout = await expectSame(id);
  expect(readout.provenance!.attempts).toBe(2);
});

it('a worker told to stop in the middle gives the readout back at once', async () => {
  const first = work(keepAll);
  const { id } = await start();
  await inTheMiddle(id);
  expect(await first.stop()).toBe(0);
  expect((await look(id)).state).toBe('queued');
  work();
  await expectSame(id);
});

it('a Redis that lost everything while a readout waits and another runs', async () => {
  work({ WORKER_READOUTS: '1' });
  const running = await start();
  await inTheMiddle(running.id);
  const waiting = await start();
  await control('redis', 'lose');
  await expectSame(running.id);
  await expectSame(waiting.id);
});

it('a Redis that is away when the readout is made', async () => {
  await control('redis', 'kill');
  const { id } = await start(); // the database has it, that is enough
  work();
  await control('redis', 'start');
  await expectSame(id);
});

it('a MariaDB that is killed and started again in the middle', async () => {
  work();
  const { id } = await start();
  await inTheMiddle(id);
  await control('mariadb', 'kill');
  await control('mariadb', 'start');
  await expectSame(id);
});

it('a store that is away: the readout waits for it', async () => {
  const { id } = await start(); // which reads the store to check the recipe
  await control('object-store', 'stop');
  work();
  await until('waiting for the store', async () => {
    const { state, progress } = await look(id);
    return state === 'done' || progress?.phase === 'Waiting for the object store';
  });
  await control('object-store', 'start');
  await expectSame(id);
});
