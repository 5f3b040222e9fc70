import { describe, expect, it } from 'vitest';
import { EngineError } from '@/lib/engine/engine-error';
import { bcaInterval } from '@/lib/engine/measures/bca-interval';
import { calibration } from '@/lib/engine/measures/calibration';
import { countExceedances } from '@/lib/engine/measures/count-exceedances';
import { effectiveTrials } from '@/lib/engine/measures/effective-trials';
import { fisherZInterval } from '@/lib/engine/measures/fisher-z-interval';
import { heldOutR2 } from '@/lib/engine/measures/held-out-r2';
import { jackknife } from '@/lib/engine/measures/jackknife';
import { lag1Autocorrelation } from '@/lib/engine/measures/lag1-autocorrelation';
import { mae } from '@/lib/engine/measures/mae';
import { meanInterval } from '@/lib/engine/measures/mean-interval';
import { nadeauBengio } from '@/lib/engine/measures/nadeau-bengio';
import { pearson } from '@/lib/engine/measures/pearson';
import { quantiles } from '@/lib/engine/measures/quantiles';
import { rmse } from '@/lib/engine/measures/rmse';
import { smallestP } from '@/lib/engine/measures/smallest-p';
import { spearman } from '@/lib/engine/measures/spearman';
import { randomSource } from '@/lib/engine/random/random-source';
import { splitGenerator } from '@/lib/engine/random/split-generator';

// Source for this file: the definitions of science; each case is an outcome that the docstring states.
const random = (): ReturnType<typeof randomSource> => randomSource(splitGenerator(5, 'degenerate'));

describe('measures where there is nothing to measure', () => {
  it('give null, never NaN or Infinity', () => {
    expect(heldOutR2([1, 1], [1, 2], [1, 1])).toBeNull();
    expect(heldOutR2([], [], [])).toBeNull();
    expect(pearson([3, 3, 3], [1, 2, 3])).toBeNull();
    expect(pearson([0.1, 0.1, 0.1], [1, 2, 3])).toBeNull();
    expect(pearson([1], [1])).toBeNull();
    expect(spearman([2, 2], [1, 2])).toBeNull();
    expect(rmse([], [])).toBeNull();
    expect(mae([], [])).toBeNull();
    expect(calibration([1, 2, 3], [0.3, 0.3, 0.3])).toBeNull();
    expect(lag1Autocorrelation([0.3, 0.3, 0.3])).toBeNull();
    expect(effectiveTrials([1, 2, 3], [0.1, 0.1, 0.1])).toBeNull();
    expect(meanInterval([1])).toBeNull();
    expect(quantiles([], [0.5])).toBeNull();
    expect(nadeauBengio([0.1], 80, 20)).toBeNull();
    expect(fisherZInterval(1, 20)).toBeNull();
    expect(fisherZInterval(0.2, 3)).toBeNull();
    expect(rmse([1e200], [-1e200])).toBeNull();
    expect(heldOutR2([1e200, 0], [0, 0], [0, 1])).toBeNull();
  });

  it('give the single value where differences do not vary', () => {
    const equal = nadeauBengio([0.5, 0.5, 0.5], 80, 20);
    expect(equal).toMatchObject({ meanDifference: 0.5, standardError: 0, t: null, p: null });
    expect(equal?.interval).toMatchObject({ low: 0.5, high: 0.5 });
    expect(jackknife(4, 2, () => 2)).toMatchObject({ standardError: 0, bias: 0, acceleration: 0 });
    expect(jackknife(3, 2, (i) => (i === 1 ? null : 2))).toBeNull();
  });
});

describe('measures given what they cannot take', () => {
  const refusals: [string, () => unknown][] = [
    ['shapeMismatch', () => heldOutR2([1, 2], [1], [1, 2])],
    ['notFinite', () => heldOutR2([1, NaN], [1, 2], [1, 2])],
    ['notFinite', () => pearson([1, Infinity], [1, 2])],
    ['invalidOption', () => meanInterval([1, 2], 1)],
    ['invalidOption', () => quantiles([1], [1.2])],
    ['invalidOption', () => smallestP(0, null)],
    ['invalidOption', () => bcaInterval([1, 2, 3], [1, -1, 1], random())],
    ['invalidOption', () => bcaInterval([1, 2, 3], [1, 1, 1], random(), { draws: 10 })],
    [
      'invalidOption',
      () =>
        bcaInterval(new Array(27).fill(1), new Array(27).fill(1), random(), { blocks: true, blockTrials: 2 }),
    ],
    ['notEstimable', () => jackknife(1, 0, () => 0)],
  ];
  it.each(refusals)('refuse with %s and a sentence', (code, act) => {
    try {
      act();
      expect.unreachable('it was accepted');
    } catch (error) {
      expect(error).toBeInstanceOf(EngineError);
      expect((error as EngineError).code).toBe(code);
      expect((error as EngineError).message.length).toBeGreaterThan(20);
    }
  });
});

describe('exceedances', () => {
  it('count ties up to rounding, and nothing else', () => {
    expect(countExceedances(0.5, [0.5, 0.5 - 5e-13, 0.5 - 2e-12, 0.6])).toBe(3);
    expect(countExceedances(-40, [-40 - 3e-11, -40 - 5e-11])).toBe(1);
  });
});
