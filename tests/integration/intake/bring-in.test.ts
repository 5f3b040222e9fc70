import { createHash } from 'node:crypto';
import { readFileSync, rmSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DELETE as removeFile, GET as getFile } from '@/app/api/v1/files/[id]/route';
import { POST as completeFile } from '@/app/api/v1/files/[id]/complete/route';
import { PUT as putPart } from '@/app/api/v1/files/[id]/parts/[n]/route';
import { GET as listFiles, POST as createFile } from '@/app/api/v1/sessions/[id]/files/route';
import { POST as previewIntake } from '@/app/api/v1/sessions/[id]/intake/preview/route';
import { GET as proposeIntake } from '@/app/api/v1/sessions/[id]/intake/proposal/route';
import { POST as submitIntake } from '@/app/api/v1/sessions/[id]/intake/route';
import { GET as getTrials } from '@/app/api/v1/sessions/[id]/data/trials/route';
import { GET as getUnits } from '@/app/api/v1/sessions/[id]/data/units/route';
import { GET as getSession } from '@/app/api/v1/sessions/[id]/route';
import { db } from '@/db/connection';
import type { DataTable } from '@/lib/contracts/data-table';
import type { StoredFile } from '@/lib/contracts/file';
import type { Intake, IntakeProposal } from '@/lib/contracts/intake';
import type { IntakePreview } from '@/lib/contracts/intake-answer';
import type { Session } from '@/lib/contracts/session';
import { closeRedis, redis } from '@/lib/jobs/connection';
import { enqueue } from '@/lib/jobs/enqueue';
import { closeQueues } from '@/lib/jobs/queues';
import type { RouteHandler } from '@/lib/http/route';
import { buildWorker, startWorker, type WorkerProcess } from '@/tests/integration/readouts/worker-process';
import { until } from '@/tests/integration/readouts/until';
import { call, tokenFor, type Call } from '@/tests/integration/server/support';
import { insertLab, insertSession, type LabRows } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';

const fixture = (path: string): Uint8Array =>
  new Uint8Array(readFileSync(new URL(`../../fixtures/${path}`, import.meta.url)));

let dropDatabase: () => Promise<void>;
let folder: string;
let worker: WorkerProcess;
let lab: LabRows;
let token: string;

beforeAll(async () => {
  dropDatabase = await freshDatabase();
  await redis().flushall();
  folder = await buildWorker();
  worker = startWorker(folder);
  lab = await insertLab();
  token = await tokenFor(lab, ['read', 'intake']);
});
afterAll(async () => {
  await worker?.stop();
  await closeQueues();
  closeRedis();
  await dropDatabase?.();
  if (folder) rmSync(folder, { recursive: true, force: true });
});

async function ask<T>(handler: RouteHandler, input: Call, status = 200): Promise<T> {
  const response = await call(handler, { token, ...input });
  const body = response.status === 204 ? undefined : ((await response.json()) as T);
  expect(response.status, JSON.stringify(body)).toBe(status);
  return body as T;
}

async function begin(
  sessionId: string,
  name: string,
  bytes: Uint8Array,
  sha256?: string,
): Promise<StoredFile> {
  return ask<StoredFile>(
    createFile,
    {
      method: 'POST',
      params: { id: sessionId },
      body: { name, sizeBytes: bytes.length, ...(sha256 ? { sha256 } : {}) },
    },
    201,
  );
}

function sendPart(
  id: string,
  n: number,
  bytes: Uint8Array,
  headers: Record<string, string> = {},
): Promise<Response> {
  return call(putPart, {
    token,
    method: 'PUT',
    params: { id, n: String(n) },
    body: bytes,
    headers: { 'content-type': 'application/octet-stream', ...headers },
  });
}

const atRest = (id: string): Promise<StoredFile> =>
  until(`the end of reading ${id}`, async () => {
    const file = await ask<StoredFile>(getFile, { params: { id } });
    return file.state === 'reading' || file.state === 'uploading' ? null : file;
  });

async function upload(sessionId: string, name: string, bytes: Uint8Array): Promise<StoredFile> {
  const { id, partSizeBytes } = await begin(sessionId, name, bytes);
  for (let n = 1, at = 0; at < bytes.length; n += 1, at += partSizeBytes)
    expect((await sendPart(id, n, bytes.subarray(at, at + partSizeBytes))).status).toBe(200);
  await ask(completeFile, { method: 'POST', params: { id } });
  return atRest(id);
}

async function takeIn(sessionId: string, intake: Partial<Intake>): Promise<Session> {
  await ask(submitIntake, { method: 'POST', params: { id: sessionId }, body: intake }, 202);
  return until(`the end of the intake of ${sessionId}`, async () => {
    const session = await ask<Session>(getSession, { params: { id: sessionId } });
    return session.state === 'checking' ? null : session;
  });
}

describe('bringing a session in', () => {
  let sessionId: string;
  let npz: StoredFile;
  let ready: Session;

  it('takes small.npz from the upload to a session that is ready', async () => {
    ({ sessionId } = await insertSession(lab));
    const bytes = fixture('sessions/small.npz');
    npz = await upload(sessionId, 'small.npz', bytes);
    expect(npz).toMatchObject({ state: 'readable', format: 'npz', problems: [], parts: [1] });
    expect(npz.sha256).toBe(createHash('sha256').update(bytes).digest('hex'));
    expect(npz.arrays.find((array) => array.path === 'counts')).toMatchObject({
      dtype: 'uint8',
      shape: [240, 60, 12],
    });

    const proposal = await ask<IntakeProposal>(proposeIntake, { params: { id: sessionId } });
    expect(proposal.intake.counts).toEqual({
      fileId: npz.id,
      path: 'counts',
      axes: ['trial', 'unit', 'bin'],
    });
    expect(proposal.intake.binWidthMs).toBe(25);
    expect(proposal.intake.labels).toEqual([
      { column: 'shared_fraction', kind: 'nominal' },
      { column: 'realised_fraction', kind: 'realised' },
    ]);
    expect(proposal.questions.map((question) => question.field)).toEqual(['windowStartMs']);

    const intake = { ...proposal.intake, windowStartMs: 0, acceptWarnings: true } as Intake;
    const preview = await ask<IntakePreview>(previewIntake, {
      method: 'POST',
      params: { id: sessionId },
      body: { intake, nTrials: 3 },
    });
    expect(preview).toMatchObject({ nTrials: 240, nUnits: 60, nBins: 12 });
    expect(preview.columns.find((column) => column.name === 'shared_fraction')!.values).toEqual([
      0.2, 0.4, 0,
    ]);

    ready = await takeIn(sessionId, intake);
    expect(ready).toMatchObject({
      state: 'ready',
      trials: 240,
      units: 60,
      bins: 12,
      binWidthMs: 25,
      dataVersion: 1,
    });
    expect(ready.labels).toEqual(proposal.intake.labels);
  });

  it('gives the tables with what follows from the counts', async () => {
    const trials = await ask<DataTable>(getTrials, { params: { id: sessionId } });
    const totals = trials.columns.find((column) => column.name === 'totalCount')!.values as number[];
    expect(trials.nRows).toBe(240);
    expect(totals.reduce((sum, value) => sum + value, 0)).toBe(28_725); // small.truth.json of the generator
    const units = await ask<DataTable>(getUnits, { params: { id: sessionId } });
    const rates = units.columns.find((column) => column.name === 'meanRateHz')!.values as number[];
    expect(rates.reduce((sum, rate) => sum + rate, 0)).toBeCloseTo(28_725 / (240 * 12 * 0.025), 8);
    expect(units.columns.filter((column) => column.isDerived).map((column) => column.name)).toEqual([
      'meanRateHz',
      'presence',
      'fano',
    ]);
  });

  it('gives the same counts hash for the same counts as wide and long tables', async () => {
    for (const name of ['small_wide.csv', 'small_long.csv']) {
      const made = await insertSession(lab);
      const counts = await upload(made.sessionId, name, fixture(`sessions/${name}`));
      const trials = await upload(made.sessionId, 'small_trials.csv', fixture('sessions/small_trials.csv'));
      const proposal = await ask<IntakeProposal>(proposeIntake, { params: { id: made.sessionId } });
      expect(proposal.intake.counts!.fileId).toBe(counts.id);
      expect(proposal.intake.trials!.fileId).toBe(trials.id);
      const long = {
        trial: 'trial',
        unit: 'unit',
        bin: 'bin',
        count: 'count',
        shape: [240, 60, 12] as [number, number, number],
      };
      const session = await takeIn(made.sessionId, {
        counts: name.includes('long') ? { fileId: counts.id, long } : proposal.intake.counts!,
        binWidthMs: 25,
        windowStartMs: 0,
        trials: { fileId: trials.id },
        labels: [{ column: 'shared_fraction', kind: 'nominal' }],
        acceptWarnings: true,
      });
      expect(session.state, JSON.stringify(session.problems)).toBe('ready');
      expect(session.countsHash).toBe(ready.countsHash);
    }
  });

  it('gives the same counts hash from MAT and from NWB, whose spikes are cut into bins', async () => {
    for (const name of ['small.mat', 'small.nwb']) {
      const made = await insertSession(lab);
      const file = await upload(made.sessionId, name, fixture(`sessions/${name}`));
      expect(file, JSON.stringify(file.problems)).toMatchObject({ state: 'readable' });
      const isNwb = name.endsWith('.nwb');
      const session = await takeIn(made.sessionId, {
        counts: isNwb
          ? { fileId: file.id, spikeTimes: { align: 'start_time', startMs: 0, endMs: 300 } }
          : { fileId: file.id, path: 'counts', axes: ['trial', 'unit', 'bin'] },
        binWidthMs: 25,
        windowStartMs: 0,
        trials: isNwb
          ? { fileId: file.id }
          : { fileId: file.id, columns: { shared_fraction: 'trials.shared_fraction' } },
        labels: [{ column: 'shared_fraction', kind: 'nominal' }],
        acceptWarnings: true,
      });
      expect(session.state, JSON.stringify(session.problems)).toBe('ready');
      expect(session.countsHash).toBe(ready.countsHash);
    }
  });

  it('waits where warnings were not accepted, refuses where a fault stops, and keeps the earlier data', async () => {
    const base: Intake = {
      counts: { fileId: npz.id, path: 'counts', axes: ['trial', 'unit', 'bin'] },
      binWidthMs: 0.025,
      windowStartMs: 0,
      trials: { fileId: npz.id, columns: { shared_fraction: 'shared_fraction', speed: 'speed' } },
      labels: [{ column: 'shared_fraction', kind: 'nominal' }],
      acceptWarnings: false,
    };
    const waiting = await takeIn(sessionId, base);
    expect(waiting.state).toBe('waiting');
    expect(waiting.problems.map((problem) => problem.code)).toContain('bin-width-odd');
    const refused = await takeIn(sessionId, {
      ...base,
      counts: { fileId: npz.id, path: 'counts', axes: ['unit', 'trial', 'bin'] },
    });
    expect(refused).toMatchObject({ state: 'refused', dataVersion: 1, dataHash: ready.dataHash });
    expect(refused.problems[0]).toMatchObject({ code: 'trials-disagree', severity: 'stops' });
    const again = await takeIn(sessionId, { ...base, binWidthMs: 25, acceptWarnings: true });
    expect(again).toMatchObject({ state: 'ready', dataVersion: 2, countsHash: ready.countsHash });
    expect(again.dataHash).not.toBe(ready.dataHash); // fewer columns than the first time
    const first = await ask<DataTable>(getTrials, { params: { id: sessionId }, path: '/x?version=1' });
    expect(first.dataHash).toBe(ready.dataHash);
  });

  it('changes nothing when a job is delivered twice', async () => {
    const intake = await db()('intakes').where({ session_id: sessionId, state: 'done' }).first();
    await enqueue('run-intake', { id: intake.id, attempt: 7 });
    await enqueue('read-file', { id: npz.id, attempt: 7 });
    await new Promise((resolve) => setTimeout(resolve, 800));
    expect(await ask<Session>(getSession, { params: { id: sessionId } })).toMatchObject({
      state: 'ready',
      dataVersion: 2,
    });
  });

  it('sends a known file once, and only where it may be read', async () => {
    const bytes = fixture('sessions/small.npz');
    const known = createHash('sha256').update(bytes).digest('hex');
    const copy = await begin(sessionId, 'again.npz', bytes, known);
    expect(copy.state).toBe('reading');
    expect(await atRest(copy.id)).toMatchObject({ state: 'readable', sha256: known });
    await ask(removeFile, { method: 'DELETE', params: { id: copy.id } }, 204);

    const stranger = await insertLab();
    const theirs = await insertSession(stranger);
    const theirToken = await tokenFor(stranger, ['read', 'intake']);
    const claimed = await call(createFile, {
      token: theirToken,
      method: 'POST',
      params: { id: theirs.sessionId },
      body: { name: 'claimed.npz', sizeBytes: bytes.length, sha256: known },
    });
    expect(((await claimed.json()) as StoredFile).state).toBe('uploading');
    // A file that is in use stays; another lab's answers like none.
    await ask(removeFile, { method: 'DELETE', params: { id: npz.id } }, 409);
    expect((await call(getFile, { token: theirToken, params: { id: npz.id } })).status).toBe(404);
  });
});

describe('an upload in parts', () => {
  it('takes parts in any order, replaces one that is sent again, and refuses what does not fit', async () => {
    const { sessionId } = await insertSession(lab);
    const text = `a,b\n${`1,${'x'.repeat(96)}\n`.repeat(90_000)}`;
    const bytes = new TextEncoder().encode(text);
    const file = await begin(sessionId, 'long.csv', bytes);
    const part = (n: number): Uint8Array =>
      bytes.subarray((n - 1) * file.partSizeBytes, n * file.partSizeBytes);
    expect(file.partSizeBytes).toBe(8 * 1024 * 1024);
    expect((await sendPart(file.id, 2, part(2))).status).toBe(200);
    expect((await sendPart(file.id, 3, part(2))).status).toBe(422);
    expect((await sendPart(file.id, 0, part(1))).status).toBe(422);
    expect((await sendPart(file.id, 1, part(1).subarray(1))).status).toBe(422);
    const wrong = createHash('sha256').update('other').digest('base64');
    expect((await sendPart(file.id, 1, part(1), { 'content-digest': `sha-256=:${wrong}:` })).status).toBe(
      422,
    );
    const early = await call(completeFile, { token, method: 'POST', params: { id: file.id } });
    expect(early.status).toBe(409);
    const garbage = new Uint8Array(part(1).length).fill(0);
    expect((await sendPart(file.id, 1, garbage)).status).toBe(200);
    const right = createHash('sha256').update(part(1)).digest('base64');
    expect((await sendPart(file.id, 1, part(1), { 'content-digest': `sha-256=:${right}:` })).status).toBe(
      200,
    );
    expect((await ask<StoredFile>(getFile, { params: { id: file.id } })).parts).toEqual([1, 2]);
    await ask(completeFile, { method: 'POST', params: { id: file.id } });
    await ask(completeFile, { method: 'POST', params: { id: file.id } });
    const read = await atRest(file.id);
    expect(read).toMatchObject({ state: 'readable', format: 'csv' });
    expect(read.sha256).toBe(createHash('sha256').update(bytes).digest('hex'));
    expect(read.arrays.map((array) => array.shape)).toEqual([[90_000], [90_000]]);
    expect((await sendPart(file.id, 1, part(1))).status).toBe(409);
    const page = await ask<{ items: StoredFile[] }>(listFiles, { params: { id: sessionId } });
    expect(page.items.map((item) => item.id)).toEqual([file.id]);
  });

  it('refuses a file whose hash is not the one that was named, an empty one, and a pickle', async () => {
    const { sessionId } = await insertSession(lab);
    const bytes = fixture('files/npy_u1_c.npy');
    const { id } = await begin(sessionId, 'x.npy', bytes, 'f'.repeat(64));
    await sendPart(id, 1, bytes);
    await ask(completeFile, { method: 'POST', params: { id } });
    expect((await atRest(id)).problems).toMatchObject([{ code: 'file-hash', severity: 'stops' }]);
    expect((await upload(sessionId, 'empty.csv', new Uint8Array(0))).problems).toMatchObject([
      { code: 'file-empty' },
    ]);
    const pickled = Uint8Array.from(bytes);
    pickled.set(new TextEncoder().encode("'|O1'"), Buffer.from(bytes).indexOf("'|u1'"));
    const refused = await upload(sessionId, 'pickled.npy', pickled);
    expect(refused).toMatchObject({
      state: 'refused',
      problems: [{ code: 'npy-pickle', place: { file: 'pickled.npy' } }],
    });
    const body = {
      counts: { fileId: refused.id, path: '', axes: ['trial', 'unit', 'bin'] },
      binWidthMs: 25,
      windowStartMs: 0,
      trials: { fileId: refused.id },
      labels: [{ column: 'a', kind: 'other' }],
    };
    const answer = await call(submitIntake, { token, method: 'POST', params: { id: sessionId }, body });
    expect(answer.status).toBe(422);
    expect(((await answer.json()) as { errors: unknown[] }).errors).toContainEqual(
      expect.objectContaining({ pointer: '/counts/fileId', code: 'file-refused' }),
    );
  });
});
