import { describe, expect, it } from 'vitest';
import { fisherZPower } from '@/lib/engine/plan/fisher-z-power';
import { fisherZSampleSize } from '@/lib/engine/plan/fisher-z-sample-size';
import { check } from '@/tests/reference/stats/checks';

describe('trials for a correlation at power .8, two-sided .05 (Cohen 1992; Hulley et al.; R 4.2.2)', () => {
  const { inputs, expected } = check<{ r: number[] }, { n: number[]; exact: number[] }>('power');
  inputs.r.forEach((r, i) => {
    it(`r = ${r}`, () => {
      const size = fisherZSampleSize(r);
      expect(size.n).toBe(expected.n[i]);
      expect(size.exact).toBeCloseTo(expected.exact[i], 4);
      expect(fisherZPower(r, size.exact, 0.05, 2)).toBeCloseTo(0.8, 12);
      expect(fisherZPower(-r, size.exact, 0.05, 2)).toBeCloseTo(0.8, 12);
    });
  });
});
