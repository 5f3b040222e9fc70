import { describe, expect, it } from 'vitest';
import type { Intake } from '@/lib/contracts/intake';
import type { Place, Severity } from '@/lib/contracts/problem';
import { makeNpy } from './make-npy';
import {
  countsId,
  nBins,
  npyOf,
  nTrials,
  nUnits,
  problemsOf,
  soundCounts,
  soundLabel,
  trialTable,
  trialsId,
  unitsId,
} from './make-session';

const shape = [nTrials, nUnits, nBins];
const cell = (trial: number, unit: number, bin: number): number => (trial * nUnits + unit) * nBins + bin;
const counts = (change: (values: Float64Array) => void): Uint8Array => {
  const values = soundCounts();
  change(values);
  return npyOf(values, shape);
};
const column = (name: string, value: (trial: number, sound: string) => string | number): string =>
  trialTable((row, trial) => (row[name] = String(value(trial, row[name]))));
const wide = (change: (rows: string[][]) => void = () => undefined): string => {
  const values = soundCounts();
  const rows = [
    ['trial', ...Array.from({ length: nUnits * nBins }, (_, i) => `u${Math.floor(i / nBins)}_b${i % nBins}`)],
  ];
  for (let trial = 0; trial < nTrials; trial++)
    rows.push([
      String(trial),
      ...Array.from(values.subarray(cell(trial, 0, 0), cell(trial + 1, 0, 0)), String),
    ]);
  change(rows);
  return rows.map((row) => row.join(',')).join('\n');
};
const wideIntake = (more: object = {}): Partial<Intake> => ({
  counts: { fileId: countsId, wide: { trial: 'trial', pattern: 'u{unit}_b{bin}', ...more } },
});
const long = (change: (rows: (string | number)[][]) => void = () => undefined): string => {
  const values = soundCounts();
  const rows: (string | number)[][] = [['trial', 'unit', 'bin', 'count']];
  values.forEach((value, at) => {
    if (value > 0)
      rows.push([Math.floor(at / nUnits / nBins), Math.floor(at / nBins) % nUnits, at % nBins, value]);
  });
  change(rows);
  return rows.map((row) => row.join(',')).join('\n');
};
const longIntake = (more: object = { shape }): Partial<Intake> => ({
  counts: {
    fileId: countsId,
    long: { trial: 'trial', unit: 'unit', bin: 'bin', count: 'count', ...more },
  } as Intake['counts'],
});
const labels = (source: object): Partial<Intake> => ({ labels: [source as Intake['labels'][number]] });

type Given = Parameters<typeof problemsOf>[0];
type Case = [name: string, given: () => Given, code: string, severity: Severity, place: Place];

const cases: Case[] = [
  [
    'a NaN',
    () => ({ counts: counts((v) => (v[cell(7, 2, 1)] = NaN)) }),
    'count-nan',
    'stops',
    { file: 'counts', path: '', trial: 7, unit: 2, bin: 1 },
  ],
  [
    'an infinite count',
    () => ({ counts: counts((v) => (v[cell(0, 0, 3)] = Infinity)) }),
    'count-infinite',
    'stops',
    { file: 'counts', path: '', trial: 0, unit: 0, bin: 3 },
  ],
  [
    'a negative count',
    () => ({ counts: counts((v) => (v[cell(23, 5, 3)] = -1)) }),
    'count-negative',
    'stops',
    { file: 'counts', path: '', trial: 23, unit: 5, bin: 3 },
  ],
  [
    'a fraction of a spike',
    () => ({ counts: counts((v) => (v[cell(1, 1, 1)] = 0.5)) }),
    'count-fraction',
    'stops',
    { file: 'counts', path: '', trial: 1, unit: 1, bin: 1 },
  ],
  [
    'an absurd count',
    () => ({ counts: counts((v) => (v[cell(2, 0, 0)] = 1e12)) }),
    'count-absurd',
    'stops',
    { file: 'counts', path: '', trial: 2, unit: 0, bin: 0 },
  ],
  [
    'a place in Fortran order',
    () => {
      const values = new Float64Array(nTrials * nUnits * nBins);
      values[5 + nTrials * (2 + nUnits * 3)] = NaN;
      return { counts: npyOf(values, shape, 'F') };
    },
    'count-nan',
    'stops',
    { file: 'counts', path: '', trial: 5, unit: 2, bin: 3 },
  ],
  [
    'text as counts',
    () => ({ counts: makeNpy({ descr: "'<U1'", shape: '(24, 6, 4)', data: new Uint8Array(24 * 24 * 4) }) }),
    'counts-not-numeric',
    'stops',
    { file: 'counts', path: '' },
  ],
  [
    'no trials',
    () => ({ counts: makeNpy({ shape: '(0, 6, 4)', data: new Uint8Array(0) }) }),
    'counts-empty',
    'stops',
    { file: 'counts', path: '' },
  ],
  [
    'axes swapped',
    () => ({ intake: { counts: { fileId: countsId, path: '', axes: ['unit', 'trial', 'bin'] } } }),
    'trials-disagree',
    'stops',
    { file: 'counts' },
  ],
  [
    'two axes named for three',
    () => ({ intake: { counts: { fileId: countsId, path: '', axes: ['trial', 'unit'] } } }),
    'axes-number',
    'stops',
    { file: 'counts', path: '' },
  ],
  [
    'an axis named twice',
    () => ({ intake: { counts: { fileId: countsId, path: '', axes: ['trial', 'trial', 'bin'] } } }),
    'axes-named',
    'stops',
    { file: 'counts', path: '' },
  ],
  [
    'an array that is not there',
    () => ({ intake: { counts: { fileId: countsId, path: 'spikes', axes: ['trial', 'unit', 'bin'] } } }),
    'array-not-found',
    'stops',
    { file: 'counts', path: 'spikes' },
  ],
  [
    'a file that is not there',
    () => ({ intake: { trials: { fileId: unitsId } } }),
    'file-not-found',
    'stops',
    {},
  ],
  [
    'one trial too many in the table',
    () => ({ trials: `${trialTable()}24,0.4,3,10,48.5\n` }),
    'trials-disagree',
    'stops',
    { file: 'counts' },
  ],
  [
    'one unit too few in the table',
    () => ({ units: 'unit,area\n0,MT\n1,MT\n', intake: { units: { fileId: unitsId } } }),
    'units-disagree',
    'stops',
    { file: 'counts' },
  ],
  [
    'a constant label',
    () => ({ trials: column('fraction', () => 0.4) }),
    'label-constant',
    'stops',
    { path: 'fraction' },
  ],
  [
    'a label without values',
    () => ({ trials: column('fraction', () => 'NaN') }),
    'label-missing',
    'stops',
    { path: 'fraction' },
  ],
  [
    'a label that is missing once',
    () => ({ trials: column('fraction', (t, v) => (t === 9 ? '' : v)) }),
    'label-missing',
    'warns',
    { path: 'fraction', trial: 9 },
  ],
  [
    'an infinite label',
    () => ({ trials: column('fraction', (t, v) => (t === 3 ? 'inf' : v)) }),
    'label-infinite',
    'stops',
    { path: 'fraction', trial: 3 },
  ],
  [
    'a label in percent',
    () => ({ trials: column('fraction', (_, v) => Number(v) * 100) }),
    'label-percent',
    'warns',
    { path: 'fraction', trial: 1 },
  ],
  [
    'a label below 0',
    () => ({ trials: column('fraction', (t, v) => (t === 5 ? -0.2 : v)) }),
    'label-range',
    'warns',
    { path: 'fraction', trial: 5 },
  ],
  [
    'a label column that is not there',
    () => ({ intake: labels({ column: 'coherence', kind: 'nominal' }) }),
    'label-not-found',
    'stops',
    { path: 'coherence' },
  ],
  [
    'a word as a label',
    () => ({ trials: column('fraction', (t) => (t % 2 ? 'high' : 'low')) }),
    'label-category',
    'stops',
    { path: 'fraction' },
  ],
  [
    'an unbalanced label',
    () => ({ trials: column('fraction', (t) => (t % 6 === 2 ? 0 : 0.4)) }),
    'label-unbalanced',
    'notes',
    { path: 'fraction' },
  ],
  [
    'a label that rises with trial order',
    () => ({ trials: column('fraction', (t) => (t / 23) ** 2) }),
    'label-confounded',
    'warns',
    { path: 'fraction' },
  ],
  [
    'a column that is the label',
    () => ({ trials: column('speed', (t) => 4 + 2 * soundLabel(t)) }),
    'column-is-label',
    'warns',
    { path: 'speed' },
  ],
  [
    'a unit that is the label',
    () => ({
      counts: counts((v) => {
        for (let t = 0; t < nTrials; t++)
          for (let b = 0; b < nBins; b++) v[cell(t, 4, b)] = Math.round(soundLabel(t) * 5);
      }),
    }),
    'unit-is-label',
    'warns',
    { unit: 4, path: 'fraction' },
  ],
  [
    'a trial that comes twice in the table',
    () => ({ trials: column('trial', (t) => (t === 11 ? 10 : t)) }),
    'trial-id-duplicate',
    'warns',
    { path: 'trial', trial: 11 },
  ],
  [
    'a trial without a number',
    () => ({ trials: column('trial', (t) => (t === 4 ? '' : t)) }),
    'trial-id-missing',
    'stops',
    { path: 'trial', trial: 4 },
  ],
  [
    'times that go back',
    () => ({ trials: column('start', (t) => (t === 6 ? 1 : 0.5 + 2 * t)) }),
    'times-unsorted',
    'warns',
    { path: 'start', trial: 6 },
  ],
  [
    'two trials at one time',
    () => ({ trials: column('start', (t) => 0.5 + 2 * (t === 6 ? 5 : t)) }),
    'times-duplicate',
    'warns',
    { path: 'start', trial: 6 },
  ],
  [
    'milliseconds for seconds',
    () => ({ trials: column('start', (t) => 500 + 2000 * t) }),
    'times-milliseconds',
    'warns',
    { path: 'start' },
  ],
  [
    'trials that overlap',
    () => ({ trials: column('start', (t) => 0.5 + 0.05 * t) }),
    'trials-overlap',
    'warns',
    { path: 'start', trial: 1 },
  ],
  [
    'a missing speed',
    () => ({ trials: column('speed', (t, v) => (t === 20 ? '' : v)) }),
    'column-missing',
    'notes',
    { path: 'speed', trial: 20 },
  ],
  [
    'a word among speeds',
    () => ({
      trials: column('speed', (t, v) => (t === 2 ? 'fast' : v)),
      intake: { trials: { fileId: trialsId, columns: { fraction: 'fraction', speed: 'speed' } } },
    }),
    'not-a-number',
    'stops',
    { file: 'trials', line: 4, column: 3 },
  ],
  [
    'a decimal comma',
    () => ({
      trials: column('speed', (t, v) => (t === 2 ? '"3,5"' : v)),
      intake: { trials: { fileId: trialsId, columns: { fraction: 'fraction', speed: 'speed' } } },
    }),
    'decimal-comma',
    'stops',
    { file: 'trials', line: 4, column: 3 },
  ],
  [
    'a silent unit',
    () => ({
      counts: counts((v) => {
        for (let t = 0; t < nTrials; t++) v.fill(0, cell(t, 3, 0), cell(t, 4, 0));
      }),
    }),
    'unit-silent',
    'notes',
    { unit: 3 },
  ],
  [
    'a constant unit',
    () => ({
      counts: counts((v) => {
        for (let t = 0; t < nTrials; t++) v.fill(2, cell(t, 3, 0), cell(t, 4, 0));
      }),
    }),
    'unit-constant',
    'warns',
    { unit: 3 },
  ],
  [
    'a unit that is another',
    () => ({
      counts: counts((v) => {
        for (let t = 0; t < nTrials; t++) v.copyWithin(cell(t, 5, 0), cell(t, 1, 0), cell(t, 2, 0));
      }),
    }),
    'unit-duplicate',
    'warns',
    { unit: 5 },
  ],
  [
    'a trial that is another',
    () => ({ counts: counts((v) => v.copyWithin(cell(14, 0, 0), cell(3, 0, 0), cell(4, 0, 0))) }),
    'trial-duplicate',
    'warns',
    { trial: 14 },
  ],
  [
    'a silent trial',
    () => ({ counts: counts((v) => v.fill(0, cell(8, 0, 0), cell(9, 0, 0))) }),
    'trial-silent',
    'warns',
    { trial: 8 },
  ],
  [
    'a trial far from the others',
    () => ({ counts: counts((v) => v.fill(40, cell(8, 0, 0), cell(9, 0, 0))) }),
    'trial-outlier',
    'notes',
    { trial: 8 },
  ],
  ['no spike at all', () => ({ counts: counts((v) => v.fill(0)) }), 'counts-all-zero', 'stops', {}],
  [
    '300 spikes in 25 ms',
    () => ({ counts: counts((v) => (v[cell(2, 1, 0)] = 300)) }),
    'counts-fast',
    'warns',
    { trial: 2, unit: 1, bin: 0 },
  ],
  [
    'counts cut off at the type’s maximum',
    () => ({
      counts: makeNpy({
        descr: "'|u1'",
        shape: '(24, 6, 4)',
        data: Uint8Array.from(soundCounts(), (v, i) => (i === 30 ? 255 : v)),
      }),
    }),
    'counts-saturated',
    'warns',
    { trial: 1, unit: 1, bin: 2 },
  ],
  ['a bin width in seconds', () => ({ intake: { binWidthMs: 0.025 } }), 'bin-width-odd', 'warns', {}],
  ['no bins before the event', () => ({ intake: { windowStartMs: 0 } }), 'no-bins-before-event', 'notes', {}],
  [
    'a unit named twice',
    () => ({
      units: 'unit,area\n0,MT\n1,MT\n2,MT\n3,V1\n3,V1\n5,V1\n',
      intake: { units: { fileId: unitsId } },
    }),
    'unit-id-duplicate',
    'warns',
    { path: 'unit', unit: 4 },
  ],
  [
    'a blank count',
    () => ({ counts: wide((r) => (r[3][2] = '')), intake: wideIntake() }),
    'count-blank',
    'stops',
    { file: 'counts', line: 4, column: 3 },
  ],
  [
    'a word for a count',
    () => ({ counts: wide((r) => (r[3][2] = 'two')), intake: wideIntake() }),
    'count-not-numeric',
    'stops',
    { file: 'counts', line: 4, column: 3 },
  ],
  [
    'a negative count in a table',
    () => ({ counts: wide((r) => (r[3][2] = '-2')), intake: wideIntake() }),
    'count-negative',
    'stops',
    { file: 'counts', line: 4, column: 3, trial: 2, unit: 0, bin: 1 },
  ],
  [
    'a trial twice in a wide table',
    () => ({ counts: wide((r) => (r[5][0] = '3')), intake: wideIntake() }),
    'trial-id-duplicate',
    'stops',
    { file: 'counts', line: 6, column: 1 },
  ],
  [
    'a trial that the trial table lacks',
    () => ({ counts: wide((r) => (r[5][0] = '77')), intake: wideIntake() }),
    'trial-unmatched',
    'stops',
    { file: 'counts', line: 6, column: 1 },
  ],
  [
    'a wide row without a trial',
    () => ({ counts: wide((r) => (r[5][0] = '')), intake: wideIntake() }),
    'trial-id-missing',
    'stops',
    { file: 'counts', line: 6, column: 1 },
  ],
  [
    'a wide column too few',
    () => ({ counts: wide((r) => r.forEach((row) => row.pop())), intake: wideIntake() }),
    'wide-gaps',
    'stops',
    { file: 'counts', line: 1 },
  ],
  [
    'a pattern that fits nothing',
    () => ({ counts: wide(), intake: wideIntake({ pattern: 'n{unit}t{bin}' }) }),
    'wide-none',
    'stops',
    { file: 'counts', line: 1 },
  ],
  [
    'a pattern without units',
    () => ({ counts: wide(), intake: wideIntake({ pattern: 'u_b{bin}' }) }),
    'wide-pattern',
    'stops',
    { file: 'counts', line: 1 },
  ],
  [
    'a huge unit number',
    () => ({ counts: wide((r) => (r[0][24] = 'u9999999_b3')), intake: wideIntake() }),
    'wide-gaps',
    'stops',
    { file: 'counts', line: 1 },
  ],
  [
    'a cell that comes twice',
    () => ({ counts: long((r) => r.push(r[9])), intake: longIntake() }),
    'long-duplicate',
    'stops',
    { file: 'counts', line: long().split('\n').length + 1 },
  ],
  [
    'a bin outside the shape',
    () => ({ counts: long((r) => r.push([2, 2, 40, 1])), intake: longIntake() }),
    'long-outside',
    'stops',
    { file: 'counts', line: long().split('\n').length + 1 },
  ],
  [
    'a unit number of a billion',
    () => ({ counts: long((r) => r.push([2, 1e9, 0, 1])), intake: longIntake({}) }),
    'counts-too-many',
    'stops',
    { file: 'counts' },
  ],
  [
    'a bin number with a fraction',
    () => ({ counts: long((r) => (r[4][2] = 1.5)), intake: longIntake() }),
    'long-index',
    'stops',
    { file: 'counts', line: 5 },
  ],
  [
    'a unit that is a name',
    () => ({ counts: long((r) => (r[4][1] = 'left')), intake: longIntake() }),
    'long-index',
    'stops',
    { file: 'counts', line: 5 },
  ],
  [
    'a blank count in the long form',
    () => ({ counts: long((r) => (r[4][3] = '')), intake: longIntake() }),
    'count-blank',
    'stops',
    { file: 'counts', line: 5, column: 4 },
  ],
  [
    'a blank bin in the long form',
    () => ({ counts: long((r) => (r[4][2] = '')), intake: longIntake() }),
    'long-blank',
    'stops',
    { file: 'counts', line: 5, column: 3 },
  ],
  [
    'numbers from 1 or from 0?',
    () => ({
      counts: long((r) =>
        r.forEach((row, i) => {
          if (i > 0) row[1] = Number(row[1]) + 1;
        }),
      ),
      intake: longIntake({}),
    }),
    'long-base',
    'stops',
    { file: 'counts' },
  ],
  [
    'a column that the table lacks',
    () => ({ counts: long(), intake: longIntake({ count: 'spikes' }) }),
    'column-not-found',
    'stops',
    { file: 'counts', line: 1 },
  ],
  [
    'a shape that is only assumed',
    () => ({ counts: long(), intake: longIntake({}) }),
    'long-shape-assumed',
    'notes',
    {},
  ],
  [
    'columns of two lengths',
    () => ({
      trials: npyOf(new Float64Array(nTrials * 2), [nTrials, 2]),
      intake: { trials: { fileId: trialsId, columns: { fraction: '' } } },
    }),
    'column-shape',
    'stops',
    { file: 'trials', path: '' },
  ],
  [
    'arrays without named columns',
    () => ({ trials: npyOf(new Float64Array(nTrials), [nTrials]) }),
    'columns-unnamed',
    'stops',
    { file: 'trials' },
  ],
];

describe('sessions with a fault', () => {
  it('a sound session has no problem', async () => {
    expect(await problemsOf()).toEqual([]);
    expect(await problemsOf({ counts: wide(), intake: wideIntake() })).toEqual([]);
    expect(await problemsOf({ counts: long(), intake: longIntake() })).toEqual([]);
  });
  for (const [name, given, code, severity, place] of cases)
    it(`${name}: ${code}`, async () => {
      const problems = await problemsOf(given());
      const found = problems.find((problem) => problem.code === code);
      expect(found, JSON.stringify(problems)).toMatchObject({ severity });
      expect(found!.place).toEqual(place);
      expect(found!.message.length).toBeGreaterThan(15);
    });
});
