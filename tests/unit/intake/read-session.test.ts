import { describe, expect, it } from 'vitest';
import type { Intake } from '@/lib/contracts/intake';
import { hashCounts } from '@/lib/intake/canonical/hash-counts';
import { writeCanonical } from '@/lib/intake/canonical/write-canonical';
import { readSession } from '@/lib/intake/mapping/read-session';
import type { SourceFile } from '@/lib/intake/mapping/source-files';
import { memorySource } from '@/lib/intake/memory-source';
import { openFile } from '@/lib/intake/readers/open-file';
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
});
