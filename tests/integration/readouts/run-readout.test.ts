import { rmSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { v7 } from 'uuid';
import { db } from '@/db/connection';
import { insertFile } from '@/db/repositories/files';
import { closeRedis, redis } from '@/lib/jobs/connection';
import { enqueue } from '@/lib/jobs/enqueue';
import { closeQueues } from '@/lib/jobs/queues';
import { provenanceSchema, readoutSchema, type Readout } from '@/lib/contracts/readout';
import type { RecipeInput } from '@/lib/contracts/recipe';
import { cancelReadout } from '@/lib/services/readouts/cancel-readout';
import { createReadout } from '@/lib/services/readouts/create-readout';
import { estimateReadout } from '@/lib/services/readouts/estimate-readout';
import { getReadout } from '@/lib/services/readouts/get-readout';
import { listPredictions } from '@/lib/services/readouts/list-predictions';
import { listReadouts } from '@/lib/services/readouts/list-readouts';
import { sendPredictions } from '@/lib/services/readouts/send-predictions';
import { keys } from '@/storage/keys';
import { objectStore } from '@/storage/object-store';
import { ctxOf } from '@/tests/integration/readouts/ctx-of';
import { makeData, makeSession, type MadeSession } from '@/tests/integration/readouts/made-session';
import { until } from '@/tests/integration/readouts/until';
import { buildWorker, startWorker, type WorkerProcess } from '@/tests/integration/readouts/worker-process';
import { insertLab } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';

/** Seconds on a machine that has nothing else to do; the limit is for one that has. */
vi.setConfig({ testTimeout: 240_000, hookTimeout: 240_000 });

let dropDatabase: () => Promise<void>;
let folder: string;
let worker: WorkerProcess;
let made: MadeSession;
const ctx = () => ctxOf(made.lab);

beforeAll(async () => {
  dropDatabase = await freshDatabase();
  await redis().flushall();
  folder = await buildWorker();
  made = await makeSession(makeData({ nTrials: 160, nUnits: 24, nBins: 4 }));
  worker = startWorker(folder);
});
afterAll(async () => {
  await worker?.stop();
  await closeQueues();
  closeRedis();
  await dropDatabase?.();
  if (folder) rmSync(folder, { recursive: true, force: true });
});

const start = (recipe: RecipeInput) => createReadout(ctx(), { sessionId: made.sessionId, recipe });
const atRest = (id: string): Promise<Readout> =>
  until(`the end of readout ${id}`, async () => {
    const readout = await getReadout(ctx(), { readoutId: id });
    return readout.state === 'queued' || readout.state === 'running' ? null : readout;
  });

/** A matrix of indices as an NPY file of the session (the format's published header, version 1.0). */
async function putNpy(rows: number[][]): Promise<string> {
  const header = `{'descr': '<i4', 'fortran_order': False, 'shape': (${rows.length}, ${rows[0].length}), }`;
  const padded = `${header.padEnd(117)}\n`;
  const bytes = Buffer.concat([
    Buffer.from([0x93, ...Buffer.from('NUMPY'), 1, 0, padded.length & 255, padded.length >> 8]),
    Buffer.from(padded, 'latin1'),
    Buffer.from(Int32Array.from(rows.flat()).buffer),
  ]);
  const id = v7();
  const { labId, userId } = made.lab;
  const key = keys.file(labId, made.sessionId, id);
  await objectStore().put(key, bytes);
  await insertFile(db(), {
    id,
    lab_id: labId,
    session_id: made.sessionId,
    name: 'permutations.npy',
    size_bytes: bytes.length,
    part_size_bytes: 8 * 2 ** 20,
    claimed_sha256: null,
    object_key: key,
    upload_id: null,
    state: 'readable',
    created_by: userId,
    created_at: new Date(),
  });
  return id;
}

describe('a readout', () => {
  it('ends with a result, a record and predictions, and is written once', async () => {
    const queued = await start({ label: 'fraction', seed: 5 });
    expect(queued).toMatchObject({ number: 1, state: 'queued', result: null });
    const done = await atRest(queued.id);
    expect(done.problems).toEqual([]);
    expect(done.state).toBe('done');
    readoutSchema.parse(done);
    expect(done.result!.counts).toMatchObject({ trialsUsed: 160, unitsUsed: 24, features: 24 });
    expect(done.result!.heldOut.r2).toBeGreaterThan(0.1);
    expect(done.result!.null).toMatchObject({ draws: 1000, exceedances: 0, p: 1 / 1001 });
    expect(done.result!.verdict.kind).toBe('carries');
    expect(provenanceSchema.parse(done.provenance)).toMatchObject({ seed: 5, attempts: 1, dataVersion: 1 });

    const page = await listPredictions(ctx(), { readoutId: done.id, limit: 100 });
    const rest = await listPredictions(ctx(), { readoutId: done.id, limit: 100, cursor: page.nextCursor! });
    const rows = [...page.items, ...rest.items];
    expect(rest.nextCursor).toBeNull();
    expect(rows.map(({ trial }) => trial).sort((a, b) => a - b)).toEqual([...Array(160).keys()]);
    // The R² of the definition, from the rows alone.
    const meanOf = (fold: number) => {
      const others = rows.filter((row) => row.fold !== fold);
      return others.reduce((sum, { label }) => sum + label, 0) / others.length;
    };
    const means = [0, 1, 2, 3, 4].map(meanOf);
    const sse = rows.reduce((sum, { label, predicted }) => sum + (label - predicted) ** 2, 0);
    const sst = rows.reduce((sum, { label, fold }) => sum + (label - means[fold]) ** 2, 0);
    expect(done.result!.heldOut.r2).toBeCloseTo(1 - sse / sst, 10);

    const csv = await sendPredictions(ctx(), { readoutId: done.id, accept: 'text/csv' });
    expect((await csv!.text()).split('\r\n')).toHaveLength(162);
    expect(await sendPredictions(ctx(), { readoutId: done.id, accept: 'application/json' })).toBeNull();

    // A second delivery of the job, and one that was made later, find nothing to do.
    const before = await db()('readouts').where({ id: done.id }).first();
    await enqueue('run-readout', { id: done.id, attempt: 0 });
    await enqueue('run-readout', { id: done.id, attempt: 7 });
    const second = await start({ label: 'fraction', seed: 5 });
    const again = await atRest(second.id);
    expect(await db()('readouts').where({ id: done.id }).first()).toEqual(before);
    // The same data, recipe and seed: the same numbers, to the last bit.
    expect(again.result).toEqual(done.result);
    expect(again.number).toBe(2);
    expect(again.provenance!.recipeHash).toBe(done.provenance!.recipeHash);
    const audit = await db()('audit_entries').where({ subject_id: done.id }).orderBy('id');
    expect(audit.map(({ action }) => action)).toEqual(['readout.create', 'readout.done']);
  });

  it('says in words why it failed, and stays in the list', async () => {
    const assignment = made.data.trials[0].values as Float64Array;
    // Every trial at the highest level in fold 0: no other fold trains without it, and fold 0 trains on none of it.
    const folds = {
      kind: 'given' as const,
      assignment: Array.from(assignment, (value) => (value === 1 ? 0 : 1)),
    };
    const failed = await atRest((await start({ label: 'fraction', folds })).id);
    expect(failed.state).toBe('failed');
    expect(failed.problems[0]).toMatchObject({ severity: 'stops' });
    expect(failed.problems[0].message.length).toBeGreaterThan(20);
    const { items } = await listReadouts(ctx(), { sessionId: made.sessionId });
    expect(items[0]).toMatchObject({ id: failed.id, state: 'failed', verdictKind: null });
    expect(items[0].statusLine).toContain('failed: ');
    expect(items.map(({ number }) => number)).toEqual([3, 2, 1]);
    expect(items[2]).toMatchObject({ verdictKind: 'carries', p: 1 / 1001 });
  });

  it('takes given folds and permutations, long ones by way of the store', async () => {
    const n = 160;
    const assignment = Array.from({ length: n }, (_, trial) => trial % 4);
    const permutations = Array.from({ length: 150 }, (_, b) =>
      Array.from({ length: n }, (_, i) => (i * 7 + b + 1) % n),
    );
    const readout = await start({
      label: 'fraction',
      folds: { kind: 'given', assignment },
      null: { kind: 'given', permutations },
    });
    expect(readout.recipe.null).toEqual({
      kind: 'given',
      draws: 150,
      inputsSha256: expect.stringMatching(/^[0-9a-f]{64}$/),
    });
    const done = await atRest(readout.id);
    expect(done.problems).toEqual([]);
    expect(done.result!.null!.draws).toBe(150);
    expect(done.result!.perFold).toHaveLength(4);
    const short = await start({
      label: 'fraction',
      folds: { kind: 'given', assignment },
      null: { kind: 'given', permutations: permutations.slice(0, 50) },
    });
    expect(short.recipe.null.permutations).toHaveLength(50);
    const shortDone = await atRest(short.id);
    expect(shortDone.result!.null!.values).toEqual(done.result!.null!.values!.slice(0, 50));
    // The same permutations as an array of a file: the same numbers, and the same hash of the recipe.
    const fileId = await putNpy(permutations);
    const fromFile = await start({
      label: 'fraction',
      seed: readout.recipe.seed,
      folds: { kind: 'given', assignment },
      null: { kind: 'given', permutations: { fileId, path: '' } },
    });
    expect(fromFile.recipe.null).toMatchObject({ draws: 150, permutations: { fileId, path: '' } });
    const fromFileDone = await atRest(fromFile.id);
    expect(fromFileDone.result).toEqual(done.result);
    expect(fromFileDone.provenance!.recipeHash).toBe(done.provenance!.recipeHash);
    const wrong = await putNpy(permutations.map((row) => row.slice(1)));
    await expect(
      start({ label: 'fraction', null: { kind: 'given', permutations: { fileId: wrong, path: '' } } }),
    ).rejects.toMatchObject({
      code: 'invalid-input',
      faults: [{ pointer: '/recipe/null/permutations/0', code: 'length' }],
    });
    await expect(
      start({ label: 'fraction', null: { kind: 'given', permutations: { fileId: wrong, path: 'other' } } }),
    ).rejects.toMatchObject({
      faults: [{ pointer: '/recipe/null/permutations/path', code: 'array-not-found' }],
    });
  });

  it('is refused at once with pointers when the recipe does not fit the session', async () => {
    await expect(start({ label: 'nothing', window: { startMs: 3, endMs: 100 } })).rejects.toMatchObject({
      code: 'invalid-input',
      faults: [{ pointer: '/recipe/window/startMs' }, { pointer: '/recipe/label' }],
    });
    await expect(start({ label: 'fraction', exclusions: { version: 4 } })).rejects.toMatchObject({
      faults: [{ pointer: '/recipe/exclusions/version' }],
    });
    const other = await insertLab();
    await expect(
      createReadout(ctxOf(other), { sessionId: made.sessionId, recipe: { label: 'fraction' } }),
    ).rejects.toMatchObject({ code: 'not-found' });
  });

  it('takes the labels of the study’s other sessions as its shuffles, as they were when it was made', async () => {
    await expect(start({ label: 'fraction', null: { kind: 'sessions' } })).rejects.toMatchObject({
      faults: [{ pointer: '/recipe/null/kind', code: 'no-other-sessions' }],
    });
    const { study_id: studyId, animal_id: animalId } = (await db()('recording_sessions')
      .where({ id: made.sessionId })
      .first()) as { study_id: string; animal_id: string };
    for (const seed of [21, 22, 23])
      await makeSession(makeData({ nTrials: 150 + seed, nUnits: 3, nBins: 2, seed }), made.lab, {
        studyId,
        animalId,
      });
    // Of another study: not used.
    await makeSession(makeData({ nTrials: 40, nUnits: 3, nBins: 2, seed: 24 }), made.lab);
    const readout = await start({ label: 'fraction', null: { kind: 'sessions' } });
    expect(readout.recipe.null).toEqual({
      kind: 'sessions',
      draws: 3,
      inputsSha256: expect.stringMatching(/^[0-9a-f]{64}$/),
    });
    const done = await atRest(readout.id);
    expect(done.problems).toEqual([]);
    expect(done.result!.null).toMatchObject({
      kind: 'sessions',
      draws: 3,
      exceedances: 0,
      p: 1 / 4,
      smallestP: 1 / 4,
    });
    expect(done.result!.warnings.map(({ code }) => code)).toContain('few-sessions-for-null');
  });

  it('carries out every control and view by its name in the recipe', async () => {
    const columns = [{ column: 'speed', term: 'linear' as const }];
    const controls: RecipeInput['controls'] = [
      { kind: 'nuisanceOnly', columns },
      { kind: 'incremental', columns: [{ column: 'block', term: 'category' }] },
      { kind: 'adjusted', columns: [{ column: 'speed', term: 'spline' }] },
      { kind: 'totalRate' },
      { kind: 'rateNormalised' },
      { kind: 'trialOrder' },
      { kind: 'window', startMs: 0, endMs: 50 },
      { kind: 'matched', column: 'speed', draws: 20 },
      { kind: 'breakCorrelations', scope: 'train' },
      { kind: 'generalise', column: 'block', train: ['b0', 'b1'], test: ['b2', 'b3'] },
      { kind: 'injection', sizes: [0.2], draws: 2 },
    ];
    const views: RecipeInput['views'] = [
      { kind: 'timeCourse', widthMs: 50, stepMs: 50 },
      { kind: 'temporalGeneralisation', widthMs: 50, stepMs: 50 },
      { kind: 'populationSize', sizes: [4, 8], draws: 3 },
      { kind: 'learning', sizes: [60, 100], draws: 2 },
      { kind: 'singleUnits' },
      { kind: 'weights' },
    ];
    const { id } = await start({
      label: 'fraction',
      window: { startMs: 50, endMs: 200 },
      null: { kind: 'free', draws: 50 },
      controls,
      views,
    });
    const done = await atRest(id);
    expect(done.problems).toEqual([]);
    const result = done.result!;
    expect(result.controls.map(({ kind }) => kind)).toEqual(controls.map(({ kind }) => kind));
    for (const { sentence, question } of result.controls)
      expect(`${question} ${sentence}`).toMatch(/\w+\?? .*\.$/s);
    expect(result.views.map(({ kind }) => kind)).toEqual(views.map(({ kind }) => kind));
    readoutSchema.parse(done);
  });

  it('is estimated without being made', async () => {
    const estimate = await estimateReadout(ctx(), {
      sessionId: made.sessionId,
      recipe: { label: 'fraction' },
    });
    expect(estimate).toMatchObject({ trials: 160, units: 24, problems: [] });
    expect(estimate.seconds).toBeGreaterThan(0);
    expect(estimate.bytes).toBeGreaterThan(0);
  });

  it('that would not fit into memory is refused with the numbers', async () => {
    await worker.stop();
    worker = startWorker(folder, { WORKER_MEMORY_BYTES: '100000' });
    const failed = await atRest((await start({ label: 'fraction' })).id);
    expect(failed).toMatchObject({ state: 'failed', problems: [{ code: 'too-large-for-memory' }] });
    await worker.stop();
    worker = startWorker(folder);
  });
});

describe('cancelling', () => {
  const long: RecipeInput = {
    label: 'fraction',
    null: { kind: 'free', draws: 100_000 },
    folds: { kind: 'stratified', k: 20, repeats: 10 },
  };
  it('ends a running readout within a second', async () => {
    const { id } = await start(long);
    await until('progress', async () => {
      const { state, progress } = await getReadout(ctx(), { readoutId: id });
      return state === 'running' && progress !== null && progress.done > 0;
    });
    const askedAt = Date.now();
    expect((await cancelReadout(ctx(), { readoutId: id })).state).toBe('running');
    const ended = await atRest(id);
    expect(ended.state).toBe('cancelled');
    expect(Date.now() - askedAt).toBeLessThan(1_000);
    await expect(cancelReadout(ctx(), { readoutId: id })).resolves.toMatchObject({ state: 'cancelled' });
  });
  it('ends a waiting readout at once, and a finished one not at all', async () => {
    await worker.stop();
    const waiting = await start({ label: 'fraction' });
    expect((await cancelReadout(ctx(), { readoutId: waiting.id })).state).toBe('cancelled');
    worker = startWorker(folder);
    const after = await atRest((await start({ label: 'fraction' })).id);
    expect(after.state).toBe('done');
    expect((await getReadout(ctx(), { readoutId: waiting.id })).state).toBe('cancelled');
    await expect(cancelReadout(ctx(), { readoutId: after.id })).rejects.toMatchObject({ code: 'conflict' });
  });
});
