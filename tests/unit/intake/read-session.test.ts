import { describe, expect, it } from 'vitest';
import type { Intake } from '@/lib/contracts/intake';
import { hashCounts } from '@/lib/intake/canonical/hash-counts';
import { writeCanonical } from '@/lib/intake/canonical/write-canonical';
import { correlation } from '@/lib/intake/checks/correlation';
import { readSession } from '@/lib/intake/mapping/read-session';
import type { SourceFile } from '@/lib/intake/mapping/source-files';
import { memorySource } from '@/lib/intake/memory-source';
import { openFile } from '@/lib/intake/readers/open-file';
import { makeNpy } from './make-npy';
import { fixture } from './support';

const ids = {
  npz: '00000000-0000-7000-8000-000000000001',
  wide: '00000000-0000-7000-8000-000000000002',
  long: '00000000-0000-7000-8000-000000000003',
  trials: '00000000-0000-7000-8000-000000000004',
};

async function open(entries: Record<string, Uint8Array | string>): Promise<Map<string, SourceFile>> {
  const files = new Map<string, SourceFile>();
  for (const [fileId, content] of Object.entries(entries)) {
    const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
    files.set(fileId, { name: fileId, file: await openFile(memorySource(bytes)) });
  }
  return files;
}

const rest = {
  binWidthMs: 25,
  windowStartMs: 0,
  labels: [{ column: 'shared_fraction', kind: 'nominal' as const }],
  acceptWarnings: true,
};

describe('one session in three formats', () => {
  it('gives the same counts from NPZ, a wide and a long table', async () => {
    const files = await open({
      [ids.npz]: fixture('sessions/small.npz'),
      [ids.wide]: fixture('sessions/small_wide.csv'),
      [ids.long]: fixture('sessions/small_long.csv'),
      [ids.trials]: fixture('sessions/small_trials.csv'),
    });
    const table = { fileId: ids.trials };
    const fromArrays: Intake = {
      ...rest,
      counts: { fileId: ids.npz, path: 'counts', axes: ['trial', 'unit', 'bin'] },
      trials: {
        fileId: ids.npz,
        columns: {
          shared_fraction: 'shared_fraction',
          speed: 'speed',
          direction: { path: 'direction', type: 'circular', periodDeg: 360 },
        },
      },
      units: {
        fileId: ids.npz,
        columns: { unit_id: 'unit_id', patch: { path: 'unit_patch', type: 'category' } },
      },
    };
    const fromWide: Intake = {
      ...rest,
      counts: { fileId: ids.wide, wide: { trial: 'trial', pattern: 'u{unit}_b{bin}' } },
      trials: table,
    };
    const fromLong: Intake = {
      ...rest,
      counts: {
        fileId: ids.long,
        long: { trial: 'trial', unit: 'unit', bin: 'bin', count: 'count', shape: [240, 60, 12] },
      },
      trials: table,
    };
    const hashes = new Set<string>();
    for (const intake of [fromArrays, fromWide, fromLong]) {
      const { data, problems } = await readSession(files, intake);
      expect(problems.filter((problem) => problem.severity === 'stops')).toEqual([]);
      expect([data!.nTrials, data!.nUnits, data!.nBins]).toEqual([240, 60, 12]);
      // small.truth.json, written by the generator beside the files: sum and sum of squares of all counts.
      const values = Array.from(data!.counts);
      expect(values.reduce((sum, value) => sum + value, 0)).toBe(28_725);
      expect(values.reduce((sum, value) => sum + value * value, 0)).toBe(41_705);
      hashes.add((await writeCanonical(data!)).countsHash);
      hashes.add(hashCounts(Int32Array.from(data!.counts), [240, 60, 12]));
    }
    expect(hashes.size).toBe(1);
  });

  it('reads every order of the axes and both layouts in memory', async () => {
    const f = await open({
      [ids.npz]: fixture('files/npy_i4_f.npy'),
      [ids.wide]: fixture('files/npy_u1_c.npy'),
    });
    const file = f.get(ids.npz)!.file.arrays[0];
    const { countsFromArray } = await import('@/lib/intake/mapping/counts-from-array');
    const one = await countsFromArray(file, ['trial', 'unit', 'bin'], 'f');
    const two = await countsFromArray(f.get(ids.wide)!.file.arrays[0], ['trial', 'unit', 'bin'], 'c');
    expect(Array.from(one.counts)).toEqual(Array.from(two.counts));
    const turned = await countsFromArray(f.get(ids.wide)!.file.arrays[0], ['bin', 'trial', 'unit'], 'c');
    expect(turned.shape).toEqual([12, 8, 40]);
    for (const [i, j, k] of [
      [0, 0, 0],
      [39, 11, 7],
      [13, 4, 2],
    ])
      expect(turned.counts[(j * 8 + k) * 40 + i]).toBe(two.counts[(i * 12 + j) * 8 + k]);
  });

  it('works a label out from the velocities, and keeps how', async () => {
    const files = await open({ [ids.npz]: fixture('sessions/small.npz') });
    const { data, problems } = await readSession(files, {
      ...rest,
      counts: { fileId: ids.npz, path: 'counts', axes: ['trial', 'unit', 'bin'] },
      trials: {
        fileId: ids.npz,
        columns: { shared_fraction: 'shared_fraction', generated: 'realised_fraction' },
      },
      labels: [
        { column: 'shared_fraction', kind: 'nominal' },
        { name: 'realised', fromStimulus: { centring: 'location', clip: false } },
      ],
      stimulus: {
        velocity: { fileId: ids.npz, path: 'velocity', axes: ['trial', 'location', 'axis', 'frame'] },
        frameMs: 25,
      },
    });
    expect(data!.stimulus).toMatchObject({ nLocations: 5, nAxes: 2, nFrames: 12, frameMs: 25 });
    expect(data!.trials.map((column) => column.name)).toEqual([
      'shared_fraction',
      'generated',
      'realised',
      'realised_low',
      'realised_high',
    ]);
    expect(data!.labels[1]).toMatchObject({
      kind: 'realised',
      made: { centring: 'location', isClipped: false },
    });
    // The generator's own realised fraction, from the processes before they were mixed, is the outside measure.
    const values = (name: string) =>
      data!.trials.find((column) => column.name === name)!.values as Float64Array;
    expect(correlation(values('realised'), values('generated')).r).toBeGreaterThan(0.9);
    expect(problems.map((problem) => problem.code)).toEqual(
      expect.arrayContaining(['label-made', 'stimulus-ceiling']),
    );
    const { parts } = await writeCanonical(data!);
    expect(parts.map((part) => part.name)).toEqual(['counts-0', 'trials', 'units', 'stimulus']);
  });

  it.each<[string, Partial<Intake>, string]>([
    [
      'no stimulus named',
      { labels: [{ name: 'x', fromStimulus: { centring: 'axis', clip: true } }] },
      'label-stimulus',
    ],
    [
      'axes in another order',
      {
        stimulus: {
          velocity: { fileId: ids.npz, path: 'velocity', axes: ['location', 'trial', 'axis', 'frame'] },
          frameMs: 25,
        },
      },
      'stimulus-trials',
    ],
    [
      'an array with other axes',
      {
        stimulus: {
          velocity: { fileId: ids.npz, path: 'counts', axes: ['trial', 'location', 'axis', 'frame'] },
          frameMs: 25,
        },
      },
      'stimulus-axes',
    ],
    [
      'one location',
      {
        stimulus: {
          velocity: { fileId: ids.long, path: '', axes: ['trial', 'location', 'axis', 'frame'] },
          frameMs: 25,
        },
        labels: [{ name: 'x', fromStimulus: { centring: 'axis', clip: true } }],
      },
      'label-not-estimable',
    ],
    [
      'strengths that are missing',
      { labels: [{ name: 'x', fromStrengths: { shared: 'shared_fraction', own: 'nowhere' } }] },
      'label-not-found',
    ],
  ])('refuses a label from a stimulus where it cannot be: %s', async (_, change, code) => {
    const files = await open({
      [ids.npz]: fixture('sessions/small.npz'),
      [ids.long]: makeNpy({ descr: "'<f4'", shape: '(240, 1, 2, 3)', data: new Uint8Array(240 * 6 * 4) }),
    });
    const { problems } = await readSession(files, {
      ...rest,
      counts: { fileId: ids.npz, path: 'counts', axes: ['trial', 'unit', 'bin'] },
      trials: { fileId: ids.npz, columns: { shared_fraction: 'shared_fraction' } },
      ...change,
    });
    expect(problems).toMatchObject([{ code, severity: 'stops' }]);
  });
});
