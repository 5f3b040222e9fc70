import { describe, expect, it } from 'vitest';
import { mean } from '@/lib/engine/measures/mean';
import { variance } from '@/lib/engine/measures/variance';
import { randomPoisson } from '@/lib/engine/random/random-poisson';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import { check } from '@/tests/reference/stats/checks';

// Source: Cox & Lewis 1966; Kass, Eden & Brown 2014 (analytic; see checks.json).
describe('the engine’s Poisson counts', () => {
  const { expected } = check<object, Record<string, number>>('poisson');
  it('are zero as often as e^(−2) and have a Fano factor of 1', () => {
    const random = splitGenerator(1, 'poisson');
    const n = 200_000;
    const counts = Float64Array.from({ length: n }, () => randomPoisson(random, 2));
    const zeros = counts.filter((count) => count === 0).length / n;
    const p0 = expected['P0(lam=2)'];
    expect(Math.abs(zeros - p0)).toBeLessThan(4 * Math.sqrt((p0 * (1 - p0)) / n));
    const fano = (variance(counts) ?? NaN) / (mean(counts) ?? NaN);
    expect(Math.abs(fano - expected.fano)).toBeLessThan(4 * Math.sqrt(2 / n));
  });
  it('scatter in Fano factor over 100 trials as √(2/(n − 1))', () => {
    const random = splitGenerator(2, 'poisson');
    const fanos = Array.from({ length: 4000 }, () => {
      const counts = Float64Array.from({ length: 100 }, () => randomPoisson(random, 30));
      return (variance(counts) ?? NaN) / (mean(counts) ?? NaN);
    });
    const sd = Math.sqrt(variance(fanos) ?? NaN);
    expect(Math.abs(sd / expected['se_fano(n=100)'] - 1)).toBeLessThan(0.05);
  });
});
