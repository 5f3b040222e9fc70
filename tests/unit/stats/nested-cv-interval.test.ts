import { describe, expect, it } from 'vitest';
import { nestedCvInterval, type NestedCvRepeat } from '@/lib/engine/measures/nested-cv-interval';
import { randomSource } from '@/lib/engine/random/random-source';
import { splitGenerator } from '@/lib/engine/random/split-generator';

function makeRepeat(n: number, nFolds: number, seed: number, pairExcess = 0.1): NestedCvRepeat {
  const random = randomSource(splitGenerator(seed, 'ncv'));
  const square = (scale: number): number => (scale * random.normal()) ** 2;
  const fold = Int32Array.from({ length: n }, (_, i) => i % nFolds);
  return {
    nFolds,
    fold,
    squaredError: Float64Array.from({ length: n }, () => square(1)),
    squaredBaseline: Float64Array.from({ length: n }, () => square(1.3)),
    pairSquaredError: Float64Array.from({ length: nFolds * n }, (_, at) =>
      fold[at % n] === Math.floor(at / n) ? NaN : square(1 + pairExcess),
    ),
    pairSquaredBaseline: Float64Array.from({ length: nFolds * n }, (_, at) =>
      fold[at % n] === Math.floor(at / n) ? NaN : square(1.3),
    ),
  };
}

/**
 * The published algorithm 1 (Bates, Hastie & Tibshirani 2024) written down list by list, for one repeat: es, a_list and b_list
 * over the folds, MSE = mean(a) − mean(b), standard error √((K − 1)/K·MSE) within its bounds.
 */
function publishedAlgorithm(repeat: NestedCvRepeat): { r2: number; se: number; corrected: number } {
  const { nFolds, fold } = repeat;
  const n = fold.length;
  const sum = (list: number[]): number => list.reduce((a, b) => a + b, 0);
  const average = (list: number[]): number => sum(list) / list.length;
  const spread = (list: number[]): number =>
    sum(list.map((x) => (x - average(list)) ** 2)) / (list.length - 1);
  const ratio = sum(Array.from(repeat.squaredError)) / sum(Array.from(repeat.squaredBaseline));
  const d = average(Array.from(repeat.squaredBaseline));
  const outer = Array.from(fold, (_, i) => (repeat.squaredError[i] - ratio * repeat.squaredBaseline[i]) / d);
  const es: number[] = [];
  const aList: number[] = [];
  const bList: number[] = [];
  for (let k = 0; k < nFolds; k += 1) {
    const inside: number[] = [];
    for (let i = 0; i < n; i += 1) {
      if (fold[i] === k) continue;
      inside.push((repeat.pairSquaredError[k * n + i] - ratio * repeat.pairSquaredBaseline[k * n + i]) / d);
    }
    const out = outer.filter((_, i) => fold[i] === k);
    aList.push((average(inside) - average(out)) ** 2);
    bList.push(spread(out) / out.length);
    es.push(...inside);
  }
  const naive = Math.sqrt(spread(outer) / n);
  const mse = average(aList) - average(bList);
  const se = Math.sqrt(((nFolds - 1) / nFolds) * Math.max(0, mse));
  const bias = (1 + (nFolds - 2) / nFolds) * (average(es) - average(outer));
  return {
    r2: 1 - ratio,
    se: Math.max(naive, Math.min(se, Math.sqrt(nFolds) * naive)),
    corrected: 1 - ratio - (average(es) - bias),
  };
}

describe('nested cross-validation interval', () => {
  for (const [n, nFolds, excess] of [
    [60, 5, 0.1],
    [63, 5, 1],
    [200, 10, 0.05],
    [12, 3, 3],
  ]) {
    it(`follows the published algorithm, n = ${n}, K = ${nFolds}`, () => {
      const repeat = makeRepeat(n, nFolds, n, excess);
      const expected = publishedAlgorithm(repeat);
      const fitted = nestedCvInterval([repeat]);
      const all = nestedCvInterval([repeat], { target: 'allTrialsReadout' });
      expect(fitted?.r2).toBeCloseTo(expected.r2, 12);
      expect(fitted?.standardError).toBeCloseTo(expected.se, 12);
      expect(fitted?.centre).toBe(fitted?.r2);
      expect(all?.centre).toBeCloseTo(expected.corrected, 12);
      // Φ⁻¹(.975) from tables.
      expect((fitted?.high ?? NaN) - (fitted?.low ?? NaN)).toBeCloseTo(
        2 * 1.959963984540054 * expected.se,
        12,
      );
    });
  }

  it('stays within the naive standard error and √K times it', () => {
    const wild = nestedCvInterval([makeRepeat(60, 5, 1, 5)]);
    expect(wild?.standardError).toBeCloseTo(Math.sqrt(5) * (wild?.naiveStandardError ?? NaN), 12);
    const calm = makeRepeat(60, 5, 2, 0);
    calm.pairSquaredError.fill(calm.squaredError.reduce((a, b) => a + b) / 60);
    calm.pairSquaredBaseline.fill(calm.squaredBaseline.reduce((a, b) => a + b) / 60);
    const least = nestedCvInterval([calm]);
    expect(least?.standardError).toBeGreaterThanOrEqual(least?.naiveStandardError ?? NaN);
  });

  it('averages over repeats', () => {
    const repeats = [makeRepeat(60, 5, 3), makeRepeat(60, 5, 4)];
    const both = nestedCvInterval(repeats);
    const single = repeats.map((repeat) => nestedCvInterval([repeat]));
    expect(both?.r2).toBeCloseTo(((single[0]?.r2 ?? NaN) + (single[1]?.r2 ?? NaN)) / 2, 12);
    expect(both?.meanSquaredError).toBeCloseTo(
      ((single[0]?.meanSquaredError ?? NaN) + (single[1]?.meanSquaredError ?? NaN)) / 2,
      12,
    );
  });

  it('leaves out trials that no fold holds out', () => {
    const repeat = makeRepeat(60, 5, 5);
    const wider: NestedCvRepeat = {
      nFolds: 5,
      fold: Int32Array.from([...repeat.fold, -1, -1]),
      squaredError: Float64Array.from([...repeat.squaredError, 99, 99]),
      squaredBaseline: Float64Array.from([...repeat.squaredBaseline, 99, 99]),
      pairSquaredError: widen(repeat.pairSquaredError),
      pairSquaredBaseline: widen(repeat.pairSquaredBaseline),
    };
    expect(nestedCvInterval([wider])).toEqual(nestedCvInterval([repeat]));
    function widen(values: Float64Array): Float64Array {
      const out = new Float64Array(5 * 62).fill(NaN);
      for (let k = 0; k < 5; k += 1) out.set(values.subarray(k * 60, k * 60 + 60), k * 62);
      return out;
    }
  });

  it('is null for two folds, single-trial folds, or labels equal to their training means', () => {
    expect(nestedCvInterval([makeRepeat(20, 2, 6)])).toBeNull();
    expect(nestedCvInterval([makeRepeat(8, 8, 6)])).toBeNull();
    const flat = makeRepeat(30, 5, 7);
    flat.squaredBaseline.fill(0);
    expect(nestedCvInterval([flat])).toBeNull();
  });

  it('refuses shapes that disagree and losses that are not finite', () => {
    const repeat = makeRepeat(30, 5, 8);
    expect(() => nestedCvInterval([{ ...repeat, pairSquaredError: new Float64Array(3) }])).toThrow(/5 × 30/);
    repeat.pairSquaredError[1] = NaN; // trial 1 is in fold 1, row 0: read
    expect(() => nestedCvInterval([repeat])).toThrow(/pair loss/);
    expect(() => nestedCvInterval([])).toThrow(/repeat/);
  });
});
