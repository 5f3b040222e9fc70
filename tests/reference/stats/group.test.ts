import { describe, expect, it } from 'vitest';
import { combineSessions } from '@/lib/engine/group/combine-sessions';
import { designEffect } from '@/lib/engine/group/design-effect';
import { prevalence } from '@/lib/engine/group/prevalence';
import { randomEffectsMean } from '@/lib/engine/group/random-effects-mean';
import { repeatReliability } from '@/lib/engine/group/repeat-reliability';
import { weightedMean } from '@/lib/engine/group/weighted-mean';
import { mean } from '@/lib/engine/measures/mean';
import { meanInterval } from '@/lib/engine/measures/mean-interval';
import { check, checkTable } from '@/tests/reference/stats/checks';

interface Summary {
  mu: number;
  se: number;
  tau2: number;
  se_tau2: number;
  I2: number;
  Q: number;
  ci: [number, number];
}

describe('BCG vaccine trials (Colditz et al., JAMA 1994; metafor 3.8-1 on R 4.2.2)', () => {
  const { inputs, expected } = check<
    { yi: number[]; vi: number[] },
    { DL: Summary; REML: Summary; FE: Summary }
  >('meta-bcg');
  const result = randomEffectsMean(inputs.yi, inputs.vi);
  it('REML mean, standard error, τ² and I²', () => {
    expect(result.mean).toBeCloseTo(expected.REML.mu, 7);
    expect(result.standardError).toBeCloseTo(expected.REML.se, 7);
    expect(result.tau2).toBeCloseTo(expected.REML.tau2, 7);
    expect(result.tau2StandardError).toBeCloseTo(expected.REML.se_tau2, 7);
    expect(100 * result.i2).toBeCloseTo(expected.REML.I2, 5);
    expect(result.intervalWald.low).toBeCloseTo(expected.REML.ci[0], 7);
    expect(result.intervalWald.high).toBeCloseTo(expected.REML.ci[1], 7);
  });
  it('Q and the fixed-effect mean', () => {
    const fixed = weightedMean(inputs.yi, inputs.vi);
    expect(result.q.statistic).toBeCloseTo(expected.DL.Q, 6);
    expect(fixed.mean).toBeCloseTo(expected.FE.mu, 8);
    expect(fixed.standardError).toBeCloseTo(expected.FE.se, 8);
  });
  it('the weighted mean at the published DerSimonian–Laird τ² has the published standard error', () => {
    const dl = weightedMean(inputs.yi, inputs.vi, expected.DL.tau2);
    expect(dl.mean).toBeCloseTo(expected.DL.mu, 8);
    expect(dl.standardError).toBeCloseTo(expected.DL.se, 8);
  });
  it('Knapp–Hartung follows its formula (Stat. Med. 2003), q worked out from the weights', () => {
    const w = inputs.vi.map((v) => 1 / (v + result.tau2));
    const q = inputs.yi.reduce((sum, y, i) => sum + w[i] * (y - result.mean) ** 2, 0) / 12;
    const se = Math.sqrt(q / w.reduce((a, b) => a + b));
    expect(result.standardErrorUnfloored).toBeCloseTo(se, 12);
    // metafor's documentation prints se .1808 and limits −1.1084, −0.3206 for these trials (from memory).
    expect(result.standardErrorUnfloored).toBeCloseTo(0.1808, 4);
    expect(result.intervalUnfloored.low).toBeCloseTo(-1.1084, 4);
    expect(result.intervalUnfloored.high).toBeCloseTo(-0.3206, 4);
    // t(12, .975) = 2.178813 (tables).
    expect((result.intervalUnfloored.high - result.intervalUnfloored.low) / 2).toBeCloseTo(2.178813 * se, 6);
  });
});

describe('equal sessions', () => {
  it('have no variance between them, and a floored interval that does not collapse', () => {
    const { inputs, expected } = check<{ yi: number[]; vi: number[] }, Record<string, number>>('meta-edge');
    const result = randomEffectsMean(inputs.yi, inputs.vi);
    expect(result.mean).toBeCloseTo(expected.mu, 12);
    expect(result.standardError).toBeCloseTo(expected.se, 12);
    expect(result.tau2).toBe(expected.tau2);
    expect(result.q.statistic).toBeCloseTo(expected.Q, 12);
    expect(result.standardErrorUnfloored).toBeCloseTo(expected.KH_se, 12);
    expect(result.standardErrorFloored).toBeCloseTo(expected.se, 12);
  });
});

describe('Rail: six rails, three travel times each (Pinheiro & Bates 2000, sec. 1.1; nlme 3.1-162)', () => {
  const { expected } = check<
    object,
    { sd_between: number; sd_within: number; mu: number; ICC1: number; mean_CI: number[] }
  >('mixed-rail');
  const table = checkTable('rail.csv');
  const rails = Array.from(new Set(table.map(([rail]) => rail)));
  const times = (rail: number): number[] => table.filter((row) => row[0] === rail).map((row) => row[1]);
  it('variances between and within, and ICC', () => {
    const result = repeatReliability(
      table.map((row) => row[1]),
      table.map((row) => row[0]),
    );
    expect(Math.sqrt(result?.varianceBetween ?? NaN)).toBeCloseTo(expected.sd_between, 5);
    expect(Math.sqrt(result?.varianceWithin ?? NaN)).toBeCloseTo(expected.sd_within, 5);
    expect(result?.icc).toBeCloseTo(expected.ICC1, 9);
    expect(result?.repeats).toBe(3);
  });
  it('two stages over rails as animals give the REML mean and interval of the mixed model', () => {
    // With equal, known within-variance the random-effects mean is the mean of the rails' means, and its unfloored standard
    // error the mixed model's. nlme's interval takes t with 12 df (18 times less 6 rails), ours with 5 (rails less 1):
    // t(12, .975) = 2.1788128, t(5, .975) = 2.5705818 (tables).
    const means = rails.map((rail) => mean(times(rail)) ?? NaN);
    const within = expected.sd_within ** 2 / 3;
    const combined = combineSessions(
      means.map((estimate, a) => ({ animal: `rail ${rails[a]}`, estimate, variance: within })),
    );
    expect(combined.overall?.mean).toBeCloseTo(expected.mu, 9);
    expect(Math.sqrt(combined.overall?.tau2 ?? NaN)).toBeCloseTo(expected.sd_between, 5);
    const standardError = (expected.mean_CI[1] - expected.mean_CI[0]) / 2 / 2.1788128;
    expect(combined.overall?.standardErrorUnfloored).toBeCloseTo(standardError, 5);
    expect(meanInterval(means)?.low).toBeCloseTo(expected.mu - 2.5705818 * standardError, 5);
    expect(combined.overall?.intervalUnfloored.high).toBeCloseTo(expected.mu + 2.5705818 * standardError, 4);
  });
});

describe('design effect (Kish 1965)', () => {
  it('of 20 values a cluster at ICC .3', () => {
    const { inputs, expected } = check<
      { m: number; icc: number; clusters: number },
      { deff: number; n_eff: number }
    >('design-effect');
    const effect = designEffect(inputs.m, inputs.icc) ?? NaN;
    expect(effect).toBeCloseTo(expected.deff, 12);
    expect((inputs.m * inputs.clusters) / effect).toBeCloseTo(expected.n_eff, 8);
  });
});

describe('prevalence', () => {
  it('puts Clopper–Pearson limits through the false-positive line', () => {
    // Clopper–Pearson 95 % limits of 7/10 are .3475471 and .9332605 (R's binom.test; from memory).
    const result = prevalence(7, 10, 0.05);
    expect(result.estimate).toBeCloseTo(0.65 / 0.95, 12);
    expect(result.interval.low).toBeCloseTo((0.3475471 - 0.05) / 0.95, 6);
    expect(result.interval.high).toBeCloseTo((0.9332605 - 0.05) / 0.95, 6);
    // 0 of 10: upper limit 1 − (α/2)^(1/10) = .3084971 in closed form.
    expect(prevalence(0, 10).interval.high).toBeCloseTo((1 - 0.025 ** 0.1 - 0.05) / 0.95, 9);
    expect(prevalence(10, 10).interval.low).toBeCloseTo((0.025 ** 0.1 - 0.05) / 0.95, 9);
  });
});
