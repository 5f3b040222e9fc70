import { describe, expect, it } from 'vitest';
import { arrayKey } from '@/lib/client/intake/array-key';
import { axisOrders } from '@/lib/client/intake/axis-orders';
import { draftFromIntake } from '@/lib/client/intake/draft-from-intake';
import { intakeFromDraft } from '@/lib/client/intake/intake-from-draft';
import { matchLengths } from '@/lib/client/intake/match-lengths';
import { listUses } from '@/lib/client/intake/list-uses';
import { codeOfUse } from '@/lib/client/intake/code-of-use';
import type { ArrayFact, StoredFile } from '@/lib/contracts/file';
import { intakeSchema, type Intake } from '@/lib/contracts/intake';

const npzId = '0190a0a0-0000-7000-8000-000000000001';
const csvId = '0190a0a0-0000-7000-8000-000000000002';

function file(id: string, name: string, format: StoredFile['format'], arrays: ArrayFact[]): StoredFile {
  return {
    id,
    sessionId: '0190a0a0-0000-7000-8000-00000000000f',
    name,
    sizeBytes: 1,
    partSizeBytes: 1,
    sha256: null,
    state: 'readable',
    format,
    parts: [],
    arrays,
    problems: [],
    createdAt: '2026-06-11T18:00:00.000Z',
  };
}
const npz = file(npzId, 'yarrow.npz', 'npz', [
  { path: 'counts', dtype: 'uint8', shape: [240, 12, 60] },
  { path: 'nominal', dtype: 'float64', shape: [240] },
  { path: 'direction', dtype: 'float64', shape: [240, 1] },
  { path: 'area', dtype: 'string', shape: [60] },
]);
const csv = file(csvId, 'long.csv', 'csv', [
  { path: 'trial', dtype: 'int64', shape: [999] },
  { path: 'unit', dtype: 'int64', shape: [999] },
  { path: 'bin', dtype: 'int64', shape: [999] },
  { path: 'n', dtype: 'int64', shape: [999] },
]);
const intake: Intake = {
  counts: { fileId: npzId, path: 'counts', axes: ['trial', 'bin', 'unit'] },
  binWidthMs: 25,
  windowStartMs: -100,
  trials: {
    fileId: npzId,
    columns: {
      nominal: { path: 'nominal', type: 'number' },
      direction: { path: 'direction', type: 'circular', periodDeg: 180 },
    },
  },
  labels: [{ column: 'nominal', kind: 'nominal' }],
  units: { fileId: npzId, columns: { area: { path: 'area', type: 'category' } } },
  acceptWarnings: false,
};

describe('a mapping as a draft', () => {
  it('comes back as it was, and the service’s schema takes it', () => {
    const outcome = intakeFromDraft(draftFromIntake(intake, [npz]), [npz]);
    expect(outcome.missing).toEqual([]);
    expect(outcome.intake).toEqual(intake);
    expect(intakeSchema.parse(outcome.intake)).toEqual(intake);
  });

  it('keeps a bare path (a number column) and a name that is not the array’s own', () => {
    const named: Intake = {
      ...intake,
      trials: { fileId: npzId, columns: { fraction: 'nominal' } },
      labels: [{ column: 'fraction', kind: 'nominal' }],
      units: undefined,
    };
    expect(intakeFromDraft(draftFromIntake(named, [npz]), [npz]).intake).toMatchObject({
      trials: { columns: { fraction: { path: 'nominal', type: 'number' } } },
      labels: [{ column: 'fraction', kind: 'nominal' }],
    });
  });

  it('says each thing that is missing, and never guesses', () => {
    const { intake: built, missing } = intakeFromDraft(draftFromIntake({}, [npz]), [npz]);
    expect(built).toBeNull();
    expect(missing).toHaveLength(4);
    expect(missing.join(' ')).toMatch(/spike counts.*trial columns.*width of a bin.*first bin starts/);
  });

  it('refuses two arrays of counts and trial columns of two files', () => {
    const draft = draftFromIntake(intake, [npz, csv]);
    draft.uses[arrayKey(csvId, 'n')] = { kind: 'trial', type: 'number' };
    expect(intakeFromDraft(draft, [npz, csv]).missing[0]).toContain('yarrow.npz and long.csv');
  });

  it('reads a table with one row a trial, unit and bin', () => {
    const draft = draftFromIntake({ ...intake, counts: undefined }, [npz, csv]);
    for (const role of ['trial', 'unit', 'bin'] as const)
      draft.uses[arrayKey(csvId, role)] = { kind: 'long', role };
    expect(intakeFromDraft(draft, [npz, csv]).missing).toEqual([
      'Say which one column holds the row’s count.',
    ]);
    draft.uses[arrayKey(csvId, 'n')] = { kind: 'long', role: 'count' };
    expect(intakeFromDraft(draft, [npz, csv]).intake?.counts).toEqual({
      fileId: csvId,
      long: { trial: 'trial', unit: 'unit', bin: 'bin', count: 'n' },
    });
    draft.longShape = { trial: 240, unit: 60, bin: null };
    expect(intakeFromDraft(draft, [npz, csv]).missing[0]).toMatch(/all three or none/);
    draft.longShape.bin = 12;
    expect(intakeFromDraft(draft, [npz, csv]).intake?.counts).toMatchObject({
      long: { shape: [240, 60, 12] },
    });
  });

  it('drops the bin axis of a matrix', () => {
    const matrix = file(npzId, 'm.npz', 'npz', [{ ...npz.arrays[0], shape: [240, 60] }, npz.arrays[1]]);
    const draft = draftFromIntake(
      { ...intake, trials: { fileId: npzId, columns: { nominal: 'nominal' } }, units: undefined },
      [matrix],
    );
    expect(intakeFromDraft(draft, [matrix]).intake?.counts).toMatchObject({ axes: ['trial', 'unit'] });
  });
});

describe('lengths along the axes', () => {
  it('follow the named order of the axes', () => {
    const draft = draftFromIntake(intake, [npz]);
    expect(matchLengths(draft, [npz]).axes).toEqual({
      trial: { lengths: [240], verdict: 'agree' },
      unit: { lengths: [60], verdict: 'agree' },
      bin: { lengths: [12], verdict: 'one only' },
    });
    const swapped = { ...draft, axes: ['trial', 'unit', 'bin'] as const };
    expect(matchLengths({ ...draft, axes: [...swapped.axes] }, [npz]).axes.unit).toEqual({
      lengths: [12, 60],
      verdict: 'differ',
    });
  });
  it('has every order of the axes once', () => {
    expect(new Set(axisOrders(3).map(String)).size).toBe(6);
    expect(axisOrders(2)).toEqual([
      ['trial', 'unit'],
      ['unit', 'trial'],
    ]);
  });
});

describe('what an array can be used as', () => {
  it('offers counts for arrays of two and three axes, columns for those of one, text as category only', () => {
    const texts = (array: ArrayFact) => listUses(array, 'npz').map((option) => option.value);
    expect(texts(npz.arrays[0])).toEqual(['counts', 'unused']);
    expect(texts(npz.arrays[3])).toEqual(['trial category', 'unit category', 'unused']);
    expect(texts({ path: 'v', dtype: 'float32', shape: [240, 12, 2, 72] })).toEqual(['unused']);
    expect(texts(npz.arrays[1])).toContain('label nominal');
  });
  it('names each use as its option does', () => {
    for (const array of [...npz.arrays, ...csv.arrays])
      for (const option of listUses(array, 'csv')) expect(codeOfUse(option.use)).toBe(option.value);
  });
});
