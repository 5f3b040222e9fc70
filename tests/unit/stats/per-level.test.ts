import { describe, expect, it } from 'vitest';
import { perLevel } from '@/lib/engine/measures/per-level';

describe('predictions per level', () => {
  it('takes few distinct labels as levels (by hand)', () => {
    const rows = perLevel([0.2, 0.8, 0.2, 0.8, 0.5], [0.3, 0.6, 0.5, 0.7, 0.4]);
    expect(rows.map((row) => row.level)).toEqual([0.2, 0.5, 0.8]);
    expect(rows.map((row) => row.nTrials)).toEqual([2, 1, 2]);
    expect(rows[0].meanPredicted).toBeCloseTo(0.4, 12);
    expect(rows[0].sdPredicted).toBeCloseTo(Math.SQRT2 * 0.1, 12);
    expect(rows[0].bias).toBeCloseTo(0.2, 12);
    // t(1, .975) = 12.7062 (tables): 0.4 ± 12.7062·0.1.
    expect(rows[0].meanInterval?.high).toBeCloseTo(0.4 + 1.27062, 4);
    expect(rows[1]).toMatchObject({ sdPredicted: null, meanInterval: null });
  });

  it('cuts a continuous label into quantile groups that keep every trial', () => {
    const label = Array.from({ length: 103 }, (_, i) => Math.sin(i) * 10);
    const rows = perLevel(label, label);
    expect(rows).toHaveLength(5);
    expect(rows.reduce((sum, row) => sum + row.nTrials, 0)).toBe(103);
    expect(
      Math.max(...rows.map((row) => row.nTrials)) - Math.min(...rows.map((row) => row.nTrials)),
    ).toBeLessThan(3);
    for (const row of rows) {
      expect(row.bias).toBe(0);
      expect(row.meanPredicted).toBeCloseTo(row.level, 12);
    }
  });

  it('leaves out groups that ties empty, and says nothing of no trials', () => {
    const label = [...new Array<number>(90).fill(0), ...Array.from({ length: 20 }, (_, i) => i + 1)];
    const rows = perLevel(label, label);
    expect(rows.reduce((sum, row) => sum + row.nTrials, 0)).toBe(110);
    expect(rows.every((row) => row.nTrials > 0)).toBe(true);
    expect(perLevel([], [])).toEqual([]);
    expect(() => perLevel([1], [1], { quantileGroups: 0 })).toThrow(/whole and positive/);
  });
});
