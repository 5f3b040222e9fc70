import { describe, expect, it } from 'vitest';
import { correlate } from '@/components/session/correlate';
import { lagOne } from '@/components/session/lag-one';
import { runningMean } from '@/components/session/running-mean';

describe('correlate', () => {
  // Anscombe, Graphs in Statistical Analysis (Am. Stat. 1973), first set: r = 0.816 to three decimals as printed there.
  const x = [10, 8, 13, 9, 11, 14, 6, 4, 12, 7, 5];
  const y = [8.04, 6.95, 7.58, 8.81, 8.33, 9.96, 7.24, 4.26, 10.84, 4.82, 5.68];
  it('gives the published correlation', () => {
    expect(correlate(x, y).r).toBeCloseTo(0.816, 3);
  });
  it('does not lose digits to a large offset', () => {
    const far = x.map((value) => value + 1e9);
    expect(correlate(far, y).r).toBeCloseTo(correlate(x, y).r ?? 0, 6);
  });
  it('leaves pairs with a missing value out and gives none without spread', () => {
    expect(correlate([...x, null], [...y, 3]).n).toBe(11);
    expect(correlate([1, 1, 1], [1, 2, 3]).r).toBeNull();
  });
});

describe('lagOne', () => {
  it('follows its definition', () => {
    // mean 2.5; squares 5; products (−1.5)(−0.5) + (−0.5)(0.5) + (0.5)(1.5) = 1.25, by hand
    expect(lagOne([1, 2, 3, 4])).toBeCloseTo(0.25, 12);
  });
  it('is -1 + 1/n for strict alternation', () => {
    const series = Array.from({ length: 100 }, (_, k) => (k % 2 === 0 ? 1 : -1));
    expect(lagOne(series)).toBeCloseTo(-0.99, 12);
  });
  it('does not join the neighbours of a missing trial', () => {
    expect(lagOne([1, null, 1, null, -2, null])).toBe(0);
  });
});

describe('runningMean', () => {
  it('shortens at the ends and skips missing values', () => {
    expect(runningMean([1, null, 3, 4, 5], 3)).toEqual([1, 2, 3.5, 4, 4.5]);
    expect(runningMean([null, null], 1)).toEqual([null, null]);
  });
});
