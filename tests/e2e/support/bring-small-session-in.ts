import { readFileSync } from 'node:fs';
import type { ApiClient } from './api-client';

/** Makes a study, an animal and a session, and brings tests/fixtures/sessions/small.npz in, all by the programming interface. */
export async function bringSmallSessionIn(api: ApiClient): Promise<{ studyId: string; sessionId: string }> {
  const study = await api.post('studies', {
    name: `Path ${Date.now()}`,
    question: 'Do these units carry it?',
  });
  const animal = await api.post('animals', {
    studyId: study.id,
    code: 'Clover',
    species: 'Callithrix jacchus',
    sex: 'female',
  });
  const session = await api.post('sessions', {
    studyId: study.id,
    animalId: animal.id,
    startedAt: '2026-06-11T09:30:00Z',
    name: 'Clover, 11 June',
  });
  const bytes = readFileSync('tests/fixtures/sessions/small.npz');
  const file = await api.post(`sessions/${session.id as string}/files`, {
    name: 'small.npz',
    sizeBytes: bytes.length,
  });
  await api.putBytes(`files/${file.id as string}/parts/1`, bytes);
  await api.post(`files/${file.id as string}/complete`);
  const read = await api.until(
    `files/${file.id as string}`,
    (body) => !['uploading', 'reading'].includes(body.state as string),
  );
  if (read.state !== 'readable') throw new Error(`small.npz ended as ${JSON.stringify(read)}`);
  await api.post(`sessions/${session.id as string}/intake`, {
    counts: { fileId: file.id, path: 'counts', axes: ['trial', 'unit', 'bin'] },
    binWidthMs: 25,
    windowStartMs: 0,
    trials: {
      fileId: file.id,
      columns: {
        shared_fraction: 'shared_fraction',
        speed: 'speed',
        direction: { path: 'direction', type: 'circular', periodDeg: 360 },
      },
    },
    labels: [{ column: 'shared_fraction', kind: 'nominal' }],
    acceptWarnings: true,
  });
  await api.until(
    `sessions/${session.id as string}`,
    (body) => !['empty', 'checking'].includes(body.state as string),
  );
  return { studyId: study.id as string, sessionId: session.id as string };
}
