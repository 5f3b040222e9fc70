import { v7 } from 'uuid';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import { db } from '@/db/connection';
import { writeCanonical } from '@/lib/intake/canonical/write-canonical';
import type { SessionData } from '@/lib/intake/session-data';
import { keys } from '@/storage/keys';
import { objectStore } from '@/storage/object-store';
import { insertLab, insertSession, type LabRows } from '@/tests/support/rows';

/** A session whose data are in the store and in the database, as intake would leave it. */
export interface MadeSession {
  lab: LabRows;
  sessionId: string;
  data: SessionData;
}

/** Counts that follow the label in some units, from a fixed seed. */
export function makeData(shape: {
  nTrials: number;
  nUnits: number;
  nBins: number;
  seed?: number;
}): SessionData {
  const { nTrials, nUnits, nBins } = shape;
  const generator = xoroshiro128plus(shape.seed ?? 11);
  const uniform = () => ((generator.next() >>> 0) + 0.5) / 2 ** 32;
  const label = Float64Array.from({ length: nTrials }, () => Math.floor(5 * uniform()) / 4);
  const gains = Float64Array.from({ length: nUnits }, (_, unit) => (unit % 3 === 0 ? 2 * uniform() - 1 : 0));
  const counts = new Uint8Array(nTrials * nUnits * nBins);
  for (let trial = 0, at = 0; trial < nTrials; trial++)
    for (let unit = 0; unit < nUnits; unit++)
      for (let bin = 0; bin < nBins; bin++, at++) {
        const rate = 1.5 + gains[unit] * (label[trial] - 0.5);
        for (let left = Math.exp(-rate), product = uniform(); product > left; product *= uniform())
          counts[at] += 1;
      }
  return {
    counts,
    nTrials,
    nUnits,
    nBins,
    binWidthMs: 50,
    windowStartMs: 0,
    trials: [
      { name: 'fraction', type: 'number', values: label },
      { name: 'speed', type: 'number', values: Float64Array.from({ length: nTrials }, () => 2 + uniform()) },
      { name: 'block', type: 'category', values: Array.from({ length: nTrials }, (_, t) => `b${t % 4}`) },
    ],
    units: [
      {
        name: 'area',
        type: 'category',
        values: Array.from({ length: nUnits }, (_, u) => (u % 2 ? 'V1' : 'MT')),
      },
    ],
    labels: [{ column: 'fraction', kind: 'nominal' }],
  };
}

/** Puts data into a session (of a new lab unless one is given). */
export async function makeSession(
  data: SessionData,
  given?: LabRows,
  place: { studyId?: string; animalId?: string } = {},
): Promise<MadeSession> {
  const lab = given ?? (await insertLab());
  const { sessionId } = await insertSession(lab, place);
  const { labId, userId } = lab;
  const { parts, dataHash, countsHash } = await writeCanonical(data);
  for (const part of parts)
    await objectStore().put(keys.dataPart(labId, sessionId, dataHash, part.name), part.bytes);
  const intakeId = v7();
  await db()('intakes').insert({
    id: intakeId,
    lab_id: labId,
    session_id: sessionId,
    mapping: '{}',
    state: 'done',
    problems: '[]',
    created_by: userId,
  });
  await db()('data_versions').insert({
    id: v7(),
    lab_id: labId,
    session_id: sessionId,
    intake_id: intakeId,
    number: 1,
    data_hash: dataHash,
    counts_hash: countsHash,
    n_trials: data.nTrials,
    n_units: data.nUnits,
    n_bins: data.nBins,
    bin_width_ms: data.binWidthMs,
    window_start_ms: data.windowStartMs,
    parts: JSON.stringify(parts.map(({ bytes: _bytes, ...record }) => record)),
    trial_columns: '[]',
    unit_columns: '[]',
    labels: JSON.stringify(data.labels),
    problems: '[]',
    created_by: userId,
  });
  await db()('recording_sessions').where({ id: sessionId }).update({ state: 'ready' });
  return { lab, sessionId, data };
}
