import { readFileSync } from 'node:fs';
import { expect, test } from '@playwright/test';
import type { APIRequestContext } from '@playwright/test';
import { apiClient } from './support/api-client';
import { bringSmallSessionIn } from './support/bring-small-session-in';

/** Made by scripts/reference/make_path_reference.py with Debian's scikit-learn; versions and seed stand in the file. */
const reference = JSON.parse(readFileSync('tests/fixtures/path-reference.json', 'utf8')) as {
  window: { startMs: number; endMs: number };
  assignment: number[];
  permutations: number[][];
  r2: number;
  penalty: number[];
  predicted: number[];
  drawn: number[];
  exceedances: number;
};

async function tokenFor(request: APIRequestContext, email: string, scopes: string[]): Promise<string> {
  const response = await request.post('/api/v1/tokens', {
    headers: {
      authorization: `Basic ${Buffer.from(`${email}:${process.env.DEMO_PASSWORD}`).toString('base64')}`,
    },
    data: { name: 'path test', scopes, expiresAt: new Date(Date.now() + 86_400_000).toISOString() },
  });
  expect(response.status()).toBe(201);
  return ((await response.json()) as { token: string }).token;
}

test('a script goes from a file to a result, and the result is scikit-learn’s', async ({ request }) => {
  const token = await tokenFor(request, 'analyst@demo.outfold.test', ['read', 'intake', 'readouts']);
  const api = apiClient(request, token);
  const { sessionId } = await bringSmallSessionIn(api);

  const session = await api.get(`sessions/${sessionId}`);
  expect(session).toMatchObject({
    state: 'ready',
    dataVersion: 1,
    trials: 240,
    units: 60,
    bins: 12,
    binWidthMs: 25,
  });

  const recipe = {
    label: 'shared_fraction',
    window: reference.window,
    estimator: { kind: 'ridge', penalty: { choose: 'leaveOneOut' } },
    folds: { kind: 'given', assignment: reference.assignment },
    null: { kind: 'given', permutations: reference.permutations },
    seed: 1,
  };
  const started = await api.post(`sessions/${sessionId}/readouts`, { recipe });
  const readout = await api.until(
    `readouts/${started.id as string}`,
    (body) => !['queued', 'running'].includes(body.state as string),
  );
  expect(readout.problems).toEqual([]);
  expect(readout.state).toBe('done');
  const result = readout.result as {
    heldOut: { r2: number; r2Interval: { low: number; high: number } };
    penalty: number[];
    null: { draws: number; exceedances: number; p: number; smallestP: number; quantiles: { max: number } };
    verdict: { kind: string };
  };
  expect(Math.abs(result.heldOut.r2 - reference.r2)).toBeLessThan(1e-10);
  result.penalty.forEach((penalty, fold) => expect(penalty / reference.penalty[fold]).toBeCloseTo(1, 9));
  expect(result.null).toMatchObject({ draws: 150, exceedances: reference.exceedances });
  expect(result.null.p).toBeCloseTo((reference.exceedances + 1) / 151, 12);
  expect(Math.abs(result.null.quantiles.max - Math.max(...reference.drawn))).toBeLessThan(1e-10);
  expect(result.heldOut.r2Interval.low).toBeLessThan(result.heldOut.r2);
  expect(result.verdict.kind).toBe('carries');

  const rows = await api.get(`readouts/${started.id as string}/predictions?limit=5000`);
  for (const row of rows.items as { trial: number; fold: number; predicted: number }[]) {
    expect(row.fold).toBe(reference.assignment[row.trial]);
    expect(Math.abs(row.predicted - reference.predicted[row.trial])).toBeLessThan(1e-10);
  }
  expect((rows.items as unknown[]).length).toBe(240);
  const csv = await request.get(`/api/v1/readouts/${started.id as string}/predictions`, {
    headers: { authorization: `Bearer ${token}`, accept: 'text/csv' },
  });
  expect((await csv.text()).trim().split('\n')).toHaveLength(241);

  const stranger = apiClient(
    request,
    await tokenFor(request, 'lead@other.outfold.test', ['read', 'readouts', 'manage']),
  );
  for (const path of [
    `sessions/${sessionId}`,
    `readouts/${started.id as string}`,
    `readouts/${started.id as string}/predictions`,
  ])
    expect(await stranger.status(path), path).toBe(404);
});
