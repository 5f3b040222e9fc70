import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Intake } from '@/lib/contracts/intake';
import { hashCounts } from '@/lib/intake/canonical/hash-counts';
import { inspectFile } from '@/lib/intake/inspect-file';
import { binSpikes } from '@/lib/intake/mapping/bin-spikes';
import { readSession } from '@/lib/intake/mapping/read-session';
import type { SourceFile } from '@/lib/intake/mapping/source-files';
import { memorySource } from '@/lib/intake/memory-source';
import { proposeMapping } from '@/lib/intake/proposal/propose-mapping';
import { openFile } from '@/lib/intake/readers/open-file';
import { fixture } from './support';

const fileId = '00000000-0000-7000-8000-000000000001';
const matId = '00000000-0000-7000-8000-000000000002';

async function open(entries: Record<string, string>): Promise<Map<string, SourceFile>> {
  const files = new Map<string, SourceFile>();
  for (const [id, path] of Object.entries(entries))
    files.set(id, { name: path, file: await openFile(memorySource(fixture(path))) });
  return files;
}
const nwb = (more: object, rest: Partial<Intake> = {}): Intake => ({
  counts: { fileId, spikeTimes: { align: 'start_time', startMs: 0, endMs: 160, ...more } },
  binWidthMs: 20,
  windowStartMs: 0,
  trials: { fileId },
  labels: [{ column: 'shared_fraction', kind: 'nominal' }],
  acceptWarnings: true,
  ...rest,
});

describe('spike times', () => {
  it('an NWB file cut into bins gives exactly the counts that its spikes were made from', async () => {
    const { data, problems } = await readSession(await open({ [fileId]: 'files/nwb_full.nwb' }), nwb({}));
    expect(problems.filter(({ severity }) => severity === 'stops')).toEqual([]);
    expect([data!.nTrials, data!.nUnits, data!.nBins]).toEqual([40, 12, 8]);
    const facts = JSON.parse(
      readFileSync(new URL('../../fixtures/files/manifest.json', import.meta.url), 'utf8'),
    ).files['nwb_full.nwb'].arrays['binned_counts(20ms,trial start)'] as {
      sum: string;
      sumsq: string;
      cells: { index: number[]; value: string }[];
    };
    const values = Array.from(data!.counts);
    expect(values.reduce((sum, value) => sum + value, 0)).toBe(Number(facts.sum));
    expect(values.reduce((sum, value) => sum + value * value, 0)).toBe(Number(facts.sumsq));
    for (const { index, value } of facts.cells)
      expect(data!.counts[(index[0] * 12 + index[1]) * 8 + index[2]]).toBe(Number(value));
    expect(data!.trials.map((column) => [column.name, column.type])).toEqual([
      ['id', 'number'],
      ['shared_fraction', 'number'],
      ['speed', 'number'],
      ['start_time', 'number'],
      ['stop_time', 'number'],
      ['tag', 'category'],
    ]);
  });

  it('the small session has the same counts from NWB, MAT and NPZ', async () => {
    const files = await open({
      [fileId]: 'sessions/small.nwb',
      [matId]: 'sessions/small.mat',
      '00000000-0000-7000-8000-000000000003': 'sessions/small.npz',
    });
    const fromNwb = await readSession(
      files,
      nwb(
        { endMs: 300 },
        { binWidthMs: 25, units: { fileId, columns: { patch: { path: 'patch', type: 'category' } } } },
      ),
    );
    const fromMat = await readSession(
      files,
      nwb(
        {},
        {
          counts: { fileId: matId, path: 'counts', axes: ['trial', 'unit', 'bin'] },
          binWidthMs: 25,
          trials: { fileId: matId, columns: { shared_fraction: 'trials.shared_fraction' } },
          units: { fileId: matId, columns: { unit_id: 'unit_id' } },
        },
      ),
    );
    const hashes = [fromNwb, fromMat].map(({ data }) => hashCounts(data!.counts, [240, 60, 12]));
    expect(hashes[0]).toBe(hashes[1]);
    expect(Array.from(fromMat.data!.counts).reduce((sum, value) => sum + value, 0)).toBe(28_725);
  });

  it('bins are half-open: a spike on an edge belongs to the bin that begins there', () => {
    const seen: number[][] = [];
    binSpikes(
      Float64Array.from([-0.5, 0, 0.1, 0.25, 0.5, 0.75, 1, 2]),
      Float64Array.from([0, 0.5]),
      { startSeconds: 0, widthSeconds: 0.25, nBins: 3 },
      (...one) => seen.push(one),
    );
    expect(seen).toEqual([
      [0, 0, 2],
      [0, 1, 1],
      [0, 2, 1],
      [1, 0, 1],
      [1, 1, 1],
      [1, 2, 1],
    ]);
  });

  it.each<[string, Intake, string]>([
    ['a window that no whole number of bins fills', nwb({ endMs: 150 }), 'window-edge'],
    ['a window that ends before it begins', nwb({ endMs: -20 }), 'window-edge'],
    ['an event that is text', nwb({ align: 'tag' }), 'align-not-numeric'],
    ['an event that is not there', nwb({ align: 'cue_time' }), 'array-not-found'],
    ['a window start that disagrees', nwb({}, { windowStartMs: 20 }), 'window-start'],
    [
      'a file without spike times',
      nwb({}, { counts: { fileId: matId, spikeTimes: { align: 'start_time', startMs: 0, endMs: 160 } } }),
      'spike-times-none',
    ],
  ])('refuses %s', async (_, intake, code) => {
    const files = await open({ [fileId]: 'files/nwb_full.nwb', [matId]: 'sessions/small.mat' });
    expect((await readSession(files, intake)).problems).toMatchObject([{ code, severity: 'stops' }]);
  });

  it('the proposal takes over the tables and asks for event and window', async () => {
    const { arrays, format } = await inspectFile(memorySource(fixture('sessions/small.nwb')), 'small.nwb');
    const { intake, questions } = proposeMapping([{ fileId, name: 'small.nwb', format: format!, arrays }]);
    expect(Object.keys(intake.trials!.columns!)).toEqual(
      expect.arrayContaining(['shared_fraction', 'speed', 'direction', 'start_time']),
    );
    expect(Object.keys(intake.units!.columns!)).toEqual(['id', 'patch']);
    expect(questions.find(({ field }) => field === 'counts.spikeTimes')!.options).toEqual([
      'start_time',
      'stop_time',
    ]);
  });

  it('the proposal for MAT finds the struct of trials', async () => {
    const { arrays, format } = await inspectFile(memorySource(fixture('sessions/small.mat')), 'small.mat');
    const { intake, questions } = proposeMapping([{ fileId, name: 'small.mat', format: format!, arrays }]);
    expect(intake.counts).toMatchObject({ path: 'counts', axes: ['trial', 'unit', 'bin'] });
    expect(intake.trials!.columns!.shared_fraction).toEqual({
      path: 'trials.shared_fraction',
      type: 'number',
    });
    expect(intake.binWidthMs).toBe(25);
    expect(questions.map(({ field }) => field)).toEqual(['windowStartMs']);
  });
});
