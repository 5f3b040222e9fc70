import { tableFromIPC } from 'apache-arrow';
import { rmSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { POST as postCancel } from '@/app/api/v1/readouts/[id]/cancel/route';
import { GET as getPredictions } from '@/app/api/v1/readouts/[id]/predictions/route';
import { GET as getReadout } from '@/app/api/v1/readouts/[id]/route';
import { POST as postEstimate } from '@/app/api/v1/sessions/[id]/readouts/estimate/route';
import { GET as listReadouts, POST as postReadout } from '@/app/api/v1/sessions/[id]/readouts/route';
import { db } from '@/db/connection';
import type { Readout } from '@/lib/contracts/readout';
import { closeRedis, redis } from '@/lib/jobs/connection';
import { closeQueues } from '@/lib/jobs/queues';
import { makeData, makeSession, type MadeSession } from '@/tests/integration/readouts/made-session';
import { until } from '@/tests/integration/readouts/until';
import { buildWorker, startWorker, type WorkerProcess } from '@/tests/integration/readouts/worker-process';
import { call, tokenFor } from '@/tests/integration/server/support';
import { insertLab } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';

const nTrials = 90;
/** Seconds on a machine that has nothing else to do; the limit is for one that has. */
vi.setConfig({ testTimeout: 240_000, hookTimeout: 240_000 });

let dropDatabase: () => Promise<void>;
let folder: string;
let worker: WorkerProcess;
let made: MadeSession;
let token: string;

beforeAll(async () => {
  dropDatabase = await freshDatabase();
  await redis().flushall();
  folder = await buildWorker();
  worker = startWorker(folder);
  made = await makeSession(makeData({ nTrials, nUnits: 12, nBins: 4 }));
  token = await tokenFor(made.lab, ['read', 'readouts']);
});
afterAll(async () => {
  await worker?.stop();
  await closeQueues();
  closeRedis();
  await dropDatabase?.();
  if (folder) rmSync(folder, { recursive: true, force: true });
});

const post = (body: unknown) =>
  call(postReadout, { method: 'POST', token, params: { id: made.sessionId }, body });
const json = async (response: Response) => (await response.json()) as Record<string, unknown>;
const read = async (id: string) =>
  (await json(await call(getReadout, { token, params: { id } }))) as unknown as Readout;
const predictions = (id: string, query: string, accept?: string) =>
  call(getPredictions, {
    token,
    params: { id },
    path: `/api/v1/readouts/${id}/predictions${query}`,
    headers: accept ? { accept } : {},
  });

describe('readouts over HTTP', () => {
  it('go from the recipe to predictions in three forms', async () => {
    const created = await post({ recipe: { label: 'fraction', null: { kind: 'free', draws: 200 } } });
    expect(created.status).toBe(201);
    const { id, state, recipe } = (await json(created)) as unknown as Readout;
    expect(state).toBe('queued');
    expect(recipe).toMatchObject({ window: { startMs: 0, endMs: 200 }, folds: { kind: 'stratified', k: 5 } });
    const done = await until('the end', async () => {
      const readout = await read(id);
      return readout.state === 'done' ? readout : null;
    });
    expect(done.result!.null!.draws).toBe(200);

    const first = await json(await predictions(id, '?limit=60'));
    expect(first.items).toHaveLength(60);
    const rest = await json(await predictions(id, `?limit=60&cursor=${String(first.nextCursor)}`));
    expect(rest).toMatchObject({ nextCursor: null });
    expect(rest.items).toHaveLength(nTrials - 60);
    expect((await predictions(id, '?limit=5001')).status).toBe(422);
    expect((await predictions(id, '?cursor=nonsense')).status).toBe(422);

    const csv = await predictions(id, '', 'text/csv');
    expect(csv.headers.get('content-type')).toContain('text/csv');
    const lines = (await csv.text()).trimEnd().split('\r\n');
    expect(lines[0]).toBe('window,repeat,fold,trial,label,predicted');
    const arrow = await predictions(id, '', 'application/vnd.apache.arrow.stream');
    expect(arrow.headers.get('content-type')).toBe('application/vnd.apache.arrow.stream');
    const table = tableFromIPC(new Uint8Array(await arrow.arrayBuffer()));
    expect(table.schema.fields.map(({ name }) => name)).toEqual(lines[0].split(','));
    expect(table.numRows).toBe(nTrials);
    // The three forms hold the same numbers, to the last digit.
    const items = [...(first.items as object[]), ...(rest.items as object[])].map((item) =>
      Object.values(item).map(Number),
    );
    expect(lines.slice(1).map((line) => line.split(',').map(Number))).toEqual(items);
    expect(table.toArray().map((row) => Object.values(row!.toJSON()).map(Number))).toEqual(items);
  });

  it('refuse what does not fit, with pointers, and make nothing', async () => {
    const before = await db()('readouts').count('* as n');
    const unfit = await post({ recipe: { label: 'fraction', window: { startMs: 7, endMs: 200 } } });
    expect(unfit.status).toBe(422);
    expect(await json(unfit)).toMatchObject({
      code: 'invalid-input',
      errors: [{ pointer: '/recipe/window/startMs', code: 'window-edge' }],
    });
    const unknown = await post({ recipe: { label: 'fraction', flds: {} } });
    expect(unknown.status).toBe(422);
    const large = await post({
      recipe: {
        label: 'fraction',
        null: {
          kind: 'given',
          permutations: Array.from({ length: 40_000 }, () => [...Array(nTrials).keys()]),
        },
      },
    });
    expect(large.status).toBe(413);
    expect(await db()('readouts').count('* as n')).toEqual(before);
  });

  it('are estimated, listed and cancelled; predictions come only when there are some', async () => {
    const estimate = await call(postEstimate, {
      method: 'POST',
      token,
      params: { id: made.sessionId },
      body: { recipe: { label: 'fraction' } },
    });
    expect(estimate.status).toBe(200);
    expect(await json(estimate)).toMatchObject({ trials: nTrials, units: 12, problems: [] });
    const created = await post({
      recipe: {
        label: 'fraction',
        null: { kind: 'free', draws: 100_000 },
        folds: { kind: 'stratified', k: 20, repeats: 5 },
      },
    });
    const { id } = await json(created);
    expect((await predictions(String(id), '')).status).toBe(409);
    const cancelled = await call(postCancel, { method: 'POST', token, params: { id: String(id) } });
    expect(cancelled.status).toBe(200);
    await until('the end', async () => (await read(String(id))).state === 'cancelled');
    const list = await json(
      await call(listReadouts, {
        token,
        params: { id: made.sessionId },
        path: '/api/v1/sessions/x/readouts?limit=1',
      }),
    );
    expect(list.items).toMatchObject([{ id, state: 'cancelled' }]);
    expect(list.nextCursor).not.toBeNull();
  });

  it('of another lab are not there', async () => {
    const stranger = await tokenFor(await insertLab(), ['read', 'readouts']);
    const { id } = (await db()('readouts').first()) as { id: string };
    for (const handler of [getReadout, getPredictions])
      expect((await call(handler, { token: stranger, params: { id } })).status).toBe(404);
    expect((await call(postCancel, { method: 'POST', token: stranger, params: { id } })).status).toBe(404);
    const made404 = await call(postReadout, {
      method: 'POST',
      token: stranger,
      params: { id: made.sessionId },
      body: { recipe: { label: 'fraction' } },
    });
    expect(made404.status).toBe(404);
  });
});
