import { describe, expect, it } from 'vitest';
import type { ArrayFact } from '@/lib/contracts/file';
import { inspectFile } from '@/lib/intake/inspect-file';
import { memorySource } from '@/lib/intake/memory-source';
import type { OfferedFile } from '@/lib/intake/proposal/offered-file';
import { proposeMapping } from '@/lib/intake/proposal/propose-mapping';
import { fixture } from './support';

const npz = (arrays: Record<string, number[]>, samples: Record<string, string[]> = {}): OfferedFile => ({
  fileId: 'a',
  name: 'session.npz',
  format: 'npz',
  arrays: Object.entries(arrays).map(([path, shape]): ArrayFact => ({
    path,
    dtype: 'float64',
    shape,
    ...(samples[path] ? { sample: samples[path] } : {}),
  })),
});

async function offered(path: string): Promise<OfferedFile> {
  const { arrays, format } = await inspectFile(memorySource(fixture(path)), path);
  return { fileId: path, name: path, format: format!, arrays };
}

describe('a proposed mapping', () => {
  it('settles all of an NPZ but the window', async () => {
    const { intake, questions } = proposeMapping([await offered('sessions/small.npz')]);
    expect(intake).toMatchObject({
      counts: { path: 'counts', axes: ['trial', 'unit', 'bin'] },
      binWidthMs: 25,
      labels: [
        { column: 'shared_fraction', kind: 'nominal' },
        { column: 'realised_fraction', kind: 'realised' },
      ],
    });
    expect(intake.trials!.columns!.direction).toEqual({
      path: 'direction',
      type: 'circular',
      periodDeg: 360,
    });
    expect(Object.keys(intake.units!.columns!)).toEqual(['unit_id', 'unit_patch']);
    expect(questions.map(({ field }) => field)).toEqual(['windowStartMs']);
  });

  it('finds wide counts and their trial table among two files', async () => {
    const { intake } = proposeMapping([
      await offered('sessions/small_trials.csv'),
      await offered('sessions/small_wide.csv'),
    ]);
    expect(intake.counts).toEqual({
      fileId: 'sessions/small_wide.csv',
      wide: { trial: 'trial', pattern: 'u{unit}_b{bin}' },
    });
    expect(intake.trials!.fileId).toBe('sessions/small_trials.csv');
  });

  it('asks for the shape of long counts', async () => {
    const { intake, questions } = proposeMapping([
      await offered('sessions/small_trials.csv'),
      await offered('sessions/small_long.csv'),
    ]);
    expect(intake.counts).toMatchObject({
      long: { trial: 'trial', unit: 'unit', bin: 'bin', count: 'count' },
    });
    expect(questions.map(({ field }) => field)).toContain('counts.long.shape');
  });

  it.each<[string, Record<string, number[]>, string[]]>([
    [
      'unit × bin × trial',
      { counts: [60, 12, 240], fraction: [240], unit_id: [60] },
      ['unit', 'bin', 'trial'],
    ],
    [
      'bin × trial × unit',
      { counts: [12, 240, 60], fraction: [240], unit_id: [60] },
      ['bin', 'trial', 'unit'],
    ],
    ['two axes, units first', { counts: [60, 240], fraction: [240], unit_id: [60] }, ['unit', 'trial']],
    [
      'trials and bins by their edges',
      { counts: [60, 240, 12], fraction: [240], bin_edges: [13] },
      ['unit', 'trial', 'bin'],
    ],
  ])('tells axes by lengths: %s', (_, arrays, axes) => {
    expect(proposeMapping([npz(arrays)]).intake.counts).toMatchObject({ axes });
  });

  it.each<[string, Record<string, number[]>, number]>([
    ['no unit table to settle units and bins', { counts: [240, 60, 12], fraction: [240] }, 2],
    ['as many units as trials', { counts: [60, 60, 12], fraction: [60], unit_id: [60] }, 2],
    ['lengths that fit nowhere', { counts: [239, 60, 12], fraction: [240], unit_id: [60] }, 6],
  ])('asks for the axes where lengths leave them open: %s', (_, arrays, nOptions) => {
    const { intake, questions } = proposeMapping([npz(arrays)]);
    expect(intake.counts).toBeUndefined();
    expect(questions.find(({ field }) => field === 'counts.axes')!.options).toHaveLength(nOptions);
  });

  it('asks which array holds the counts, which column is the label, and a width without a unit', () => {
    const two = proposeMapping([npz({ counts_a: [24, 6, 4], counts_b: [24, 6, 4], speed: [24] })]);
    expect(two.questions[0]).toMatchObject({ field: 'counts', options: { length: 2 } });
    const open = proposeMapping([
      npz(
        { counts: [24, 6, 4], speed: [24], contrast: [24], unit_id: [6], bin_width: [] },
        { bin_width: ['0.025'] },
      ),
    ]);
    expect(open.intake.labels).toBeUndefined();
    expect(open.questions.find(({ field }) => field === 'labels')!.options).toEqual(['speed', 'contrast']);
    expect(open.questions.find(({ field }) => field === 'binWidthMs')!.options).toEqual([
      '0.025 ms',
      '25 ms',
    ]);
  });
});
