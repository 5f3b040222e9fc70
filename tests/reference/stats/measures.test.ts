import { describe, expect, it } from 'vitest';
import { addOnePValue } from '@/lib/engine/measures/add-one-p-value';
import { bcaLimits } from '@/lib/engine/measures/bca-limits';
import { benjaminiHochberg } from '@/lib/engine/measures/benjamini-hochberg';
import { calibration } from '@/lib/engine/measures/calibration';
import { fisherZInterval } from '@/lib/engine/measures/fisher-z-interval';
import { heldOutR2 } from '@/lib/engine/measures/held-out-r2';
import { holm } from '@/lib/engine/measures/holm';
import { jackknife } from '@/lib/engine/measures/jackknife';
import { lag1Autocorrelation } from '@/lib/engine/measures/lag1-autocorrelation';
import { logArrangements } from '@/lib/engine/measures/log-arrangements';
import { mean } from '@/lib/engine/measures/mean';
import { meanInterval } from '@/lib/engine/measures/mean-interval';
import { nadeauBengio } from '@/lib/engine/measures/nadeau-bengio';
import { pearson } from '@/lib/engine/measures/pearson';
import { quantiles } from '@/lib/engine/measures/quantiles';
import { rmse } from '@/lib/engine/measures/rmse';
import { smallestP } from '@/lib/engine/measures/smallest-p';
import { spearman } from '@/lib/engine/measures/spearman';
import { variance } from '@/lib/engine/measures/variance';
import { randomSource } from '@/lib/engine/random/random-source';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import { check, norris } from '@/tests/reference/stats/checks';

// Every published number here is read from tests/fixtures/checks/checks.json, which names its source and what verified it.

describe('correlation and resampling of the law-school data (Efron 1979; R 4.2.2)', () => {
  const { inputs, expected } = check<
    { lsat: number[]; gpa: number[] },
    Record<string, number> & Record<string, number[]>
  >('law-school');
  const { lsat, gpa } = inputs;
  const r = pearson(lsat, gpa) ?? NaN;
  const leaveOut = (values: number[], i: number): number[] => values.filter((_, j) => j !== i);

  it('Pearson and Spearman', () => {
    expect(r).toBeCloseTo(expected.r, 11);
    expect(spearman(lsat, gpa)).toBeCloseTo(expected.spearman, 11);
  });
  it('jackknife standard error, bias and acceleration', () => {
    const result = jackknife(15, r, (i) => pearson(leaveOut(lsat, i), leaveOut(gpa, i)));
    expect(result?.standardError).toBeCloseTo(expected.jack_se, 11);
    expect(result?.bias).toBeCloseTo(expected.jack_bias, 11);
    expect(result?.acceleration).toBeCloseTo(expected.accel_jackknife, 11);
  });
  it('Fisher z intervals', () => {
    const wide = fisherZInterval(r, 15, 0.95);
    const narrow = fisherZInterval(r, 15, 0.9);
    expect([wide?.low, wide?.high]).toEqual([
      expect.closeTo(expected.fisher_CI95[0], 9),
      expect.closeTo(expected.fisher_CI95[1], 9),
    ]);
    expect([narrow?.low, narrow?.high]).toEqual([
      expect.closeTo(expected.fisher_CI90[0], 9),
      expect.closeTo(expected.fisher_CI90[1], 9),
    ]);
  });
});

describe("Anscombe's quartet (Am. Stat. 1973; R 4.2.2)", () => {
  // The data are printed in the paper; typed from memory, the expected r, slope and R² confirm them.
  const x = [10, 8, 13, 9, 11, 14, 6, 4, 12, 7, 5];
  const sets = [
    { x, y: [8.04, 6.95, 7.58, 8.81, 8.33, 9.96, 7.24, 4.26, 10.84, 4.82, 5.68] },
    { x, y: [9.14, 8.14, 8.74, 8.77, 9.26, 8.1, 6.13, 3.1, 9.13, 7.26, 4.74] },
    { x, y: [7.46, 6.77, 12.74, 7.11, 7.81, 8.84, 6.08, 5.39, 8.15, 6.42, 5.73] },
    {
      x: [8, 8, 8, 8, 8, 8, 8, 19, 8, 8, 8],
      y: [6.58, 5.76, 7.71, 8.84, 8.47, 7.04, 5.25, 12.5, 5.56, 7.91, 6.89],
    },
  ];
  const { expected } = check<object, { r: number[]; spearman: number[]; slope: number[]; R2: number[] }>(
    'anscombe',
  );
  sets.forEach((set, s) => {
    it(`set ${s + 1}: r, ρ (midranks), slope and R²`, () => {
      expect(pearson(set.x, set.y)).toBeCloseTo(expected.r[s], 10);
      expect(spearman(set.x, set.y)).toBeCloseTo(expected.spearman[s], 10);
      const line = calibration(set.y, set.x);
      expect(line?.slope).toBeCloseTo(expected.slope[s], 10);
      const fitted = set.x.map((value) => (line?.intercept ?? NaN) + (line?.slope ?? NaN) * value);
      const centre = mean(set.y) ?? NaN;
      expect(
        heldOutR2(
          set.y,
          fitted,
          set.y.map(() => centre),
        ),
      ).toBeCloseTo(expected.R2[s], 10);
    });
  });
});

describe('calibration line on NIST StRD Norris', () => {
  it('gives the certified coefficients to 10 digits', () => {
    const { x, y } = norris();
    const { expected } = check<object, { B: [number, number]; resid_sd: number }>('ols-norris');
    const line = calibration(y, x);
    expect(Math.abs((line?.intercept ?? NaN) / expected.B[0] - 1)).toBeLessThan(1e-10);
    expect(Math.abs((line?.slope ?? NaN) / expected.B[1] - 1)).toBeLessThan(1e-12);
    const fitted = x.map((value) => (line?.intercept ?? NaN) + (line?.slope ?? NaN) * value);
    const sd = (rmse(y, fitted) ?? NaN) * Math.sqrt(36 / 34);
    expect(Math.abs(sd / expected.resid_sd - 1)).toBeLessThan(1e-10);
  });
});

describe('held-out R² of a readout that only knows the training mean', () => {
  const { inputs, expected } = check<{ n: number[] }, { R2_overall_mean: number[]; R2_train_mean: number[] }>(
    'null-r2',
  );
  inputs.n.forEach((n, k) => {
    it(`n = ${n}: 0 against the training mean, 1 − (n/(n − 1))² against the overall mean`, () => {
      const y = Array.from({ length: n }, (_, i) => Math.sin(3 * i) + i / 7);
      const all = mean(y) ?? NaN;
      const without = y.map((value) => (all * n - value) / (n - 1));
      expect(heldOutR2(y, without, without)).toBeCloseTo(expected.R2_train_mean[k], 12);
      expect(
        heldOutR2(
          y,
          without,
          y.map(() => all),
        ),
      ).toBeCloseTo(expected.R2_overall_mean[k], 10);
    });
  });
});

describe('p values', () => {
  it('add-one p (Phipson & Smyth 2010)', () => {
    const { inputs, expected } = check<{ cases: [number, number][] }, { p: number[] }>('perm-addone');
    expect(inputs.cases.map(([b, m]) => addOnePValue(b, m))).toEqual(expected.p);
  });
  it('smallest p that few arrangements allow (two-sided sign flip: 2/2ⁿ)', () => {
    // One-sided there are 2ⁿ arrangements; the published table doubles.
    const { inputs, expected } = check<{ n: number[] }, { p: number[] }>('perm-minp');
    const p = inputs.n.map((n) => 2 * smallestP(100_000, n * Math.log(2)));
    p.forEach((value, i) => expect(value).toBeCloseTo(expected.p[i], 12));
  });
  it('counts distinct arrangements (multinomial coefficients, by hand)', () => {
    expect(Math.exp(logArrangements([1, 1, 2, 2], null))).toBeCloseTo(6, 10);
    expect(Math.exp(logArrangements([1, 2, 3, 4], [0, 0, 1, 1]))).toBeCloseTo(4, 10);
    expect(logArrangements([5, 5, 5], null)).toBe(0);
    // ln 500! from R's lgamma(501), typed from memory and equal to Stirling's series to 12 digits.
    const labels = Array.from({ length: 500 }, (_, i) => i);
    expect(logArrangements(labels, null)).toBeCloseTo(2611.330458460156, 8);
  });
  it('Benjamini–Hochberg on the 15 p values of their paper', () => {
    const { inputs, expected } = check<{ p: number[] }, { adj_BH: number[]; rejected_BH: number }>('bh1995');
    const adjusted = benjaminiHochberg(inputs.p);
    adjusted.forEach((value, i) => expect(value).toBeCloseTo(expected.adj_BH[i], 11));
    expect(adjusted.filter((value) => value <= 0.05)).toHaveLength(expected.rejected_BH);
  });
  it('Holm: on the same p values as many as Bonferroni, by hand', () => {
    const { inputs, expected } = check<{ p: number[] }, { rejected_bonferroni: number }>('bh1995');
    // Holm rejects while p₍ᵢ₎ ≤ .05/(16 − i): .0001, .0004, .0019 ≤ .05/13, and .0095 > .05/12.
    const adjusted = holm(inputs.p);
    expect(adjusted.filter((value) => value <= 0.05)).toHaveLength(expected.rejected_bonferroni);
    expect(adjusted[3]).toBeCloseTo(0.0095 * 12, 12);
    // R's documentation-style example, worked by hand: (.01, .04, .03) → (.03, .06, .06).
    expect(holm([0.01, 0.04, 0.03])).toEqual([0.03, 0.06, 0.06]);
  });
  it('corrected resampled t (Nadeau & Bengio 2003; SciPy 1.10.1)', () => {
    const { inputs, expected } = check<
      { d: number[]; n_train: number; n_test: number },
      { t_corrected: number; p_two: number }
    >('nadeau-bengio');
    const result = nadeauBengio(inputs.d, inputs.n_train, inputs.n_test);
    expect(result?.t).toBeCloseTo(expected.t_corrected, 10);
    expect(result?.p).toBeCloseTo(expected.p_two, 10);
    expect(result?.df).toBe(9);
    const { low, high } = result?.interval ?? { low: NaN, high: NaN };
    expect(low).toBeGreaterThan(0); // p < .05 if and only if the 95 % interval leaves 0 out
    expect((low + high) / 2).toBeCloseTo(mean(inputs.d) ?? NaN, 12);
  });
});

describe('moments and quantiles', () => {
  it('NIST StRD NumAcc1: mean, standard deviation and lag-1 autocorrelation', () => {
    const { inputs, expected } = check<{ y: number[] }, { mean: number; sd: number; lag1: number }>(
      'lag1-numacc',
    );
    expect(mean(inputs.y)).toBe(expected.mean);
    expect(Math.sqrt(variance(inputs.y) ?? NaN)).toBeCloseTo(expected.sd, 9);
    expect(lag1Autocorrelation(inputs.y)).toBeCloseTo(expected.lag1, 9);
  });
  it('NIST StRD NumAcc3 and NumAcc4: alternating around a large mean (certified values from memory)', () => {
    for (const base of [1_000_000, 10_000_000]) {
      const y = [base + 0.2];
      for (let i = 0; i < 500; i += 1) y.push(base + 0.1, base + 0.3);
      expect(mean(y)).toBeCloseTo(base + 0.2, 8);
      expect(Math.sqrt(variance(y) ?? NaN)).toBeCloseTo(0.1, 7);
      expect(lag1Autocorrelation(y)).toBeCloseTo(-0.999, 6);
    }
  });
  it('type-7 quantiles (Hyndman & Fan 1996), by hand', () => {
    expect(quantiles([4, 1, 3, 2], [0, 0.25, 0.5, 0.75, 1])).toEqual([1, 1.75, 2.5, 3.25, 4]);
    expect(quantiles([10], [0.3])).toEqual([10]);
  });
  it("Darwin's maize: mean difference and its t interval (Fisher 1935; R 4.2.2)", () => {
    const { inputs, expected } = check<{ d: number[] }, { t: number; p_t: number; sum: number }>(
      'perm-darwin',
    );
    expect((mean(inputs.d) ?? NaN) * 15).toBeCloseTo(expected.sum, 10);
    const t = (mean(inputs.d) ?? NaN) / Math.sqrt((variance(inputs.d) ?? NaN) / 15);
    expect(t).toBeCloseTo(expected.t, 8);
    // The interval at level 1 − p just touches 0.
    const interval = meanInterval(inputs.d, 1 - expected.p_t);
    expect(interval?.low).toBeCloseTo(0, 5);
  });
});

describe('BCa limits', () => {
  it('without bias or acceleration are the percentile limits', () => {
    const replicates = Array.from({ length: 2001 }, (_, i) => i / 2000);
    const limits = bcaLimits(0.5, replicates, 0, 0.9);
    expect(limits.biasCorrection).toBeCloseTo(0, 12);
    expect(limits.low).toBeCloseTo(0.05, 10);
    expect(limits.high).toBeCloseTo(0.95, 10);
  });
  it('of a variance: spatial test data A (Efron & Tibshirani, An Introduction to the Bootstrap, 1993, table 14.1; from memory)', () => {
    // Published: variance 171.5, â = .061, ẑ₀ = .146, 90 % limits 115.8 and 259.6 from 2,000 bootstrap samples.
    const a = [
      48, 36, 20, 29, 42, 42, 20, 42, 22, 41, 45, 14, 6, 0, 33, 28, 34, 4, 32, 24, 47, 41, 24, 26, 30, 41,
    ];
    const observed = variance(a, 0) ?? NaN;
    expect(observed).toBeCloseTo(171.5, 1);
    const without = jackknife(26, observed, (i) =>
      variance(
        a.filter((_, j) => j !== i),
        0,
      ),
    );
    expect(without?.acceleration).toBeCloseTo(0.061, 3);
    const random = randomSource(splitGenerator(1, 'spatial test'));
    const replicates = Array.from(
      { length: 4000 },
      () =>
        variance(
          a.map(() => a[random.integer(26)]),
          0,
        ) ?? NaN,
    );
    const limits = bcaLimits(observed, replicates, without?.acceleration ?? NaN, 0.9);
    expect(Math.abs(limits.biasCorrection - 0.146)).toBeLessThan(0.07);
    expect(Math.abs(limits.low - 115.8)).toBeLessThan(6);
    expect(Math.abs(limits.high - 259.6)).toBeLessThan(12);
  });
  it("follow Efron's formula (1987, eq. 2.3) with bias and acceleration, worked by hand", () => {
    // Replicates uniform on 0…1, so that the quantile at α is α. z₀ = Φ⁻¹(.6) = .2533471, a = .1, 90 %:
    // z = ∓1.6448536: low Φ(z₀ + (z₀ − 1.6448536)/(1 + .1391506)) = Φ(−.9681765) = .1664791;
    // high Φ(z₀ + 1.8982008/(1 − .1898201)) = Φ(2.5962838) = .9952880 (Φ from tables, 6 digits).
    const replicates = Array.from({ length: 2001 }, (_, i) => i / 2000);
    const limits = bcaLimits(0.6, replicates, 0.1, 0.9);
    expect(limits.low).toBeCloseTo(0.16648, 3);
    expect(limits.high).toBeCloseTo(0.99529, 4);
  });
});
