import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { GET, POST } from '@/app/api/v1/sessions/[id]/exclusions/route';
import { GET as getSession } from '@/app/api/v1/sessions/[id]/route';
import { db } from '@/db/connection';
import { insertLab, insertSession, type LabRows } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';
import { call, giveData, tokenFor } from './support';

let drop: () => Promise<void>;
let lead: LabRows;
let token: string;
beforeAll(async () => {
  drop = await freshDatabase();
  lead = await insertLab();
  token = await tokenFor(lead, ['intake']);
});
afterAll(() => drop());

const post = (id: string, body: unknown) => call(POST, { method: 'POST', token, params: { id }, body });
const json = async (response: Response) => (await response.json()) as Record<string, unknown>;

describe('exclusions', () => {
  it('are only ever added, numbered, and can be read as they were', async () => {
    const { sessionId } = await insertSession(lead);
    await giveData(lead, sessionId, { trials: 20, units: 5, bins: 3 });
    const first = await post(sessionId, { trials: [7, 3, 3], reason: 'Eyes closed' });
    expect(first.status).toBe(201);
    expect(await json(first)).toMatchObject({
      version: 1,
      items: [
        {
          version: 1,
          kind: 'trial',
          action: 'leaveOut',
          indices: [3, 7],
          reason: 'Eyes closed',
          authorName: lead.userName,
        },
      ],
      excludedTrials: [3, 7],
      excludedUnits: [],
    });
    expect((await post(sessionId, { units: [4], reason: 'Drifts' })).status).toBe(201);
    expect(
      await json(
        await post(sessionId, { action: 'putBack', trials: [3], reason: 'Eyes were open after all' }),
      ),
    ).toMatchObject({
      version: 3,
      excludedTrials: [7],
      excludedUnits: [4],
    });
    const then = await call(GET, { token, params: { id: sessionId }, path: '/?version=1' });
    expect(await json(then)).toMatchObject({ version: 1, excludedTrials: [3, 7], excludedUnits: [] });
    const rows = await db()('audit_entries').where({ subject_id: sessionId, action: 'exclusion.create' });
    expect(rows).toHaveLength(3);
  });

  it('number parallel entries without gaps or doubles', async () => {
    const { sessionId } = await insertSession(lead);
    await giveData(lead, sessionId, { trials: 20, units: 5, bins: 3 });
    const answers = await Promise.all(
      Array.from({ length: 10 }, (_, trial) => post(sessionId, { trials: [trial], reason: 'parallel' })),
    );
    expect(answers.map(({ status }) => status)).toEqual(Array(10).fill(201));
    const versions = await Promise.all(answers.map(async (answer) => Number((await json(answer)).version)));
    expect(versions.sort((a, b) => a - b)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10]);
  });

  it('name every index that is not there, and need data and a reason', async () => {
    const { sessionId } = await insertSession(lead);
    expect((await post(sessionId, { trials: [0], reason: 'too early' })).status).toBe(409);
    await giveData(lead, sessionId, { trials: 20, units: 5, bins: 3 });
    const beyond = await post(sessionId, { trials: [19, 20, 99], reason: 'beyond' });
    expect(beyond.status).toBe(422);
    expect((await json(beyond)).errors).toMatchObject([{ pointer: '/trials/1' }, { pointer: '/trials/2' }]);
    for (const body of [
      { trials: [1], reason: '  ' },
      { trials: [-1], reason: 'x' },
      { trials: [1.5], reason: 'x' },
      { trials: [], reason: 'x' },
      { trials: [1], units: [1], reason: 'x' },
      { action: 'putBack', trials: [1], reason: 'x' },
    ])
      expect((await post(sessionId, body)).status, JSON.stringify(body)).toBe(422);
    // Text that is longest in bytes still fits its column.
    expect((await post(sessionId, { trials: [1], reason: '🐭'.repeat(10_000) })).status).toBe(201);
  });
});

describe('a session', () => {
  it('shows the facts of its newest data version', async () => {
    const { sessionId } = await insertSession(lead);
    expect(await json(await call(getSession, { token, params: { id: sessionId } }))).toMatchObject({
      state: 'empty',
      dataVersion: null,
      trials: null,
      trialColumns: [],
    });
    await giveData(lead, sessionId, { trials: 20, units: 5, bins: 3 });
    expect(await json(await call(getSession, { token, params: { id: sessionId } }))).toMatchObject({
      state: 'ready',
      dataVersion: 1,
      trials: 20,
      units: 5,
      bins: 3,
      binWidthMs: 20,
    });
  });
});
