import { describe, expect, it } from 'vitest';
import { applyExclusions } from '@/lib/services/exclusions/apply-exclusions';
import { exclusionFaults } from '@/lib/services/exclusions/exclusion-faults';

describe('applyExclusions', () => {
  it('applies entries in order: what was put back can be left out again', () => {
    expect(
      applyExclusions([
        { action: 'leaveOut', kind: 'trial', indices: [9, 2, 5] },
        { action: 'putBack', kind: 'trial', indices: [5, 9] },
        { action: 'leaveOut', kind: 'unit', indices: [2] },
        { action: 'leaveOut', kind: 'trial', indices: [9] },
      ]),
    ).toEqual({ trials: [2, 9], units: [2] });
    expect(applyExclusions([])).toEqual({ trials: [], units: [] });
  });
});

describe('exclusionFaults', () => {
  it('names each index that is beyond the data or not left out', () => {
    const base = { kind: 'trial', count: 10, leftOut: [3] } as const;
    expect(exclusionFaults({ ...base, action: 'leaveOut', indices: [0, 9, 10, 12] })).toMatchObject([
      { pointer: '/trials/2', code: 'out-of-range' },
      { pointer: '/trials/3', code: 'out-of-range' },
    ]);
    expect(exclusionFaults({ ...base, action: 'putBack', indices: [3, 4] })).toMatchObject([
      { pointer: '/trials/1', code: 'not-left-out' },
    ]);
    expect(
      exclusionFaults({
        ...base,
        action: 'leaveOut',
        indices: Array.from({ length: 500 }, (_, i) => 10 + i),
      }),
    ).toHaveLength(100);
  });
});
