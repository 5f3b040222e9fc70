import { describe, expect, it } from 'vitest';
import { excludedWithReasons } from '@/components/session/excluded-with-reasons';
import { findBlockColumn } from '@/components/session/find-block-column';
import { sortUnits } from '@/components/session/sort-units';
import { spellRanges } from '@/components/session/spell-ranges';
import type { UnitRow } from '@/components/session/unit-row';
import type { Exclusion } from '@/lib/contracts/session';

describe('spellRanges', () => {
  it('counts from 1, joins stretches and says how many more', () => {
    expect(spellRanges([310, 311, 312, 11, 487])).toBe('12, 311–313, 488');
    expect(spellRanges([0, 2, 4, 6, 7], 2)).toBe('1, 3 and 3 more');
  });
});

const unit = (index: number, rateHz: number, fano: number | null): UnitRow => ({
  unit: index,
  rateHz,
  presence: 1,
  fano,
  values: [`area ${index % 2}`],
  out: null,
});

describe('sortUnits', () => {
  const rows = [unit(0, 2, null), unit(1, 5, 1.2), unit(2, 5, 0.9)];
  it('keeps missing values last both ways and breaks ties by unit', () => {
    expect(sortUnits(rows, 'fano', true).map((row) => row.unit)).toEqual([1, 2, 0]);
    expect(sortUnits(rows, 'fano', false).map((row) => row.unit)).toEqual([2, 1, 0]);
    expect(sortUnits(rows, 'rateHz', true).map((row) => row.unit)).toEqual([1, 2, 0]);
  });
  it('sorts by a column of the file', () => {
    expect(sortUnits(rows, 0, false).map((row) => row.unit)).toEqual([0, 2, 1]);
  });
});

const entry = (
  version: number,
  action: Exclusion['action'],
  indices: number[],
  reason: string,
): Exclusion => ({
  version,
  action,
  kind: 'trial',
  indices,
  reason,
  authorId: '00000000-0000-7000-8000-000000000000',
  authorName: 'Maud',
  createdAt: '2026-05-14T12:40:00Z',
});

describe('excludedWithReasons', () => {
  it('applies entries in order and keeps the last reason', () => {
    const list = {
      version: 3,
      items: [
        entry(3, 'leaveOut', [5], 'again'),
        entry(1, 'leaveOut', [4, 5], 'light'),
        entry(2, 'putBack', [5], 'no'),
      ],
      excludedTrials: [4, 5],
      excludedUnits: [],
    };
    expect(excludedWithReasons(list, 'trial').map(({ index, reason }) => [index, reason])).toEqual([
      [4, 'light'],
      [5, 'again'],
    ]);
    expect(excludedWithReasons(list, 'unit')).toEqual([]);
  });
});

describe('findBlockColumn', () => {
  const column = (name: string, values: (number | string)[]) => ({ name, type: 'category' as const, values });
  it('takes the recipe’s column first, then one by name, never one that changes all the time', () => {
    const set = column('set', ['a', 'a', 'a', 'a', 'a', 'b', 'b', 'b', 'b', 'b']);
    const block = column('block', [1, 1, 1, 1, 1, 1, 2, 2, 2, 2]);
    expect(findBlockColumn([set, block], 'set')?.name).toBe('set');
    expect(findBlockColumn([set, block])?.name).toBe('block');
    expect(findBlockColumn([column('block', [1, 2, 1, 2, 1, 2, 1, 2])])).toBeNull();
  });
});
