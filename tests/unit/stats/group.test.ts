import { describe, expect, it } from 'vitest';
import { combineSessions, type SessionEstimate } from '@/lib/engine/group/combine-sessions';
import { combinedNull } from '@/lib/engine/group/combined-null';
import { designEffect } from '@/lib/engine/group/design-effect';
import { fisherZDelta } from '@/lib/engine/group/fisher-z-delta';
import { logErrorRatioDelta } from '@/lib/engine/group/log-error-ratio-delta';
import { prevalence } from '@/lib/engine/group/prevalence';
import { randomEffectsMean } from '@/lib/engine/group/random-effects-mean';
import { repeatReliability } from '@/lib/engine/group/repeat-reliability';
import { randomSource } from '@/lib/engine/random/random-source';
import { splitGenerator } from '@/lib/engine/random/split-generator';

const stream = (...indices: number[]): ReturnType<typeof randomSource> =>
  randomSource(splitGenerator(9, 'group', ...indices));

describe('sessions of animals in two stages', () => {
  const sessions: SessionEstimate[] = [
    { animal: 'W1', estimate: 0.3, variance: 0.01 },
    { animal: 'W2', estimate: 0.1, variance: 0.02 },
    { animal: 'W1', estimate: 0.35, variance: 0.015 },
    { animal: 'W3', estimate: 0.25, variance: 0.01 },
  ];
  it('takes a single session as it is, and an animal’s mean from its own sessions', () => {
    const { animals, overall, sessionShares } = combineSessions(sessions);
    expect(animals.map((one) => one.animal)).toEqual(['W1', 'W2', 'W3']);
    expect(animals[1]).toMatchObject({ estimate: 0.1, variance: 0.02, within: null });
    const w1 = randomEffectsMean([0.3, 0.35], [0.01, 0.015]);
    expect(animals[0].estimate).toBe(w1.mean);
    expect(animals[0].variance).toBeCloseTo(w1.standardError ** 2, 15);
    const total = sessionShares.reduce((sum, share) => sum + share, 0);
    expect(total).toBeCloseTo(1, 12);
    const weighted = sessions.reduce((sum, session, s) => sum + sessionShares[s] * session.estimate, 0);
    expect(weighted).toBeCloseTo(overall?.mean ?? NaN, 12);
  });
  it('leaves out each animal in turn', () => {
    const { leaveOneAnimalOut } = combineSessions(sessions);
    expect(leaveOneAnimalOut.map((one) => one.animal)).toEqual(['W1', 'W2', 'W3']);
    expect(leaveOneAnimalOut[0].overall.mean).toBe(randomEffectsMean([0.1, 0.25], [0.02, 0.01]).mean);
  });
  it('says so when there is one animal', () => {
    const one = combineSessions(sessions.filter((session) => session.animal === 'W1'));
    expect(one.overall).toBeNull();
    expect(one.statement).toContain('one animal');
    expect(Array.from(one.sessionShares).reduce((a, b) => a + b)).toBeCloseTo(1, 12);
    expect(combineSessions(sessions.slice(0, 2)).leaveOneAnimalOut).toEqual([]);
  });
  it('covers the mean over animals near its level where flat pooling does not', () => {
    // Source: simulation of the model; 6 animals, 5 sessions each, animals differ by sd .1, sessions by .03, noise .05.
    let twoStage = 0;
    let flat = 0;
    const runs = 400;
    for (let run = 0; run < runs; run += 1) {
      const random = stream(1, run);
      const simulated: SessionEstimate[] = [];
      for (let a = 0; a < 6; a += 1) {
        const own = 0.2 + 0.1 * random.normal();
        for (let s = 0; s < 5; s += 1) {
          const estimate = own + 0.03 * random.normal() + 0.05 * random.normal();
          simulated.push({ animal: `${a}`, estimate, variance: 0.05 ** 2 });
        }
      }
      const { interval } = combineSessions(simulated).overall ?? { interval: { low: 9, high: 9 } };
      if (interval.low <= 0.2 && 0.2 <= interval.high) twoStage += 1;
      const pooled = randomEffectsMean(
        simulated.map((s) => s.estimate),
        simulated.map((s) => s.variance),
      ).interval;
      if (pooled.low <= 0.2 && 0.2 <= pooled.high) flat += 1;
    }
    expect(twoStage / runs).toBeGreaterThan(0.92);
    expect(twoStage / runs).toBeLessThan(0.99);
    expect(flat / runs).toBeLessThan(0.85);
  });
  it('never gives NaN: variances of very different size, two estimates, no sessions', () => {
    const wide = randomEffectsMean([0.1, 0.5, -3], [1e-12, 1, 1e12]);
    for (const value of [
      wide.mean,
      wide.tau2,
      wide.i2,
      wide.tau2StandardError,
      wide.q.p,
      wide.interval.high,
    ]) {
      expect(Number.isFinite(value)).toBe(true);
    }
    expect(randomEffectsMean([0.1, 0.2], [0.01, 0.01]).predictionInterval).toBeNull();
    expect(() => combineSessions([])).toThrow(/no session/);
    expect(() => randomEffectsMean([0.1, 0.2], [0.01, 0])).toThrow(/not positive/);
    expect(() => randomEffectsMean([0.1], [0.01])).toThrow(/at least 2/);
  });
});

describe('combined null over sessions', () => {
  it('weights sessions as the estimate does and counts by the add-one rule', () => {
    const draws = [Float64Array.from([0, 0, 0]), Float64Array.from([1, 1, 1, 1])];
    const result = combinedNull([0.5, 1], draws, [1, 3], stream(2));
    expect(result.observed).toBeCloseTo(0.875, 12);
    expect(Array.from(result.draws)).toEqual([0.75, 0.75, 0.75]);
    expect(result).toMatchObject({ exceedances: 0, p: 0.25, smallestP: 0.25 });
  });
  it('pairs the draws of sessions at random, using each at most once', () => {
    const session = Float64Array.from({ length: 500 }, (_, b) => b);
    const { draws } = combinedNull([1, 1], [session, session], [1, 1], stream(3));
    // In step the draws would be 0…499 with variance n²/12; paired at random half of it.
    const centre = draws.reduce((a, b) => a + b) / 500;
    const spread = draws.reduce((a, b) => a + (b - centre) ** 2, 0) / 500;
    expect(centre).toBeCloseTo(249.5, 9);
    expect(spread / (500 ** 2 / 12)).toBeGreaterThan(0.4);
    expect(spread / (500 ** 2 / 12)).toBeLessThan(0.6);
  });
  it('keeps its level without signal', () => {
    let hits = 0;
    for (let run = 0; run < 500; run += 1) {
      const random = stream(4, run);
      const sessions = [0, 1, 2].map(() => Float64Array.from({ length: 99 }, () => random.normal()));
      const observed = [random.normal(), random.normal(), random.normal()];
      if (combinedNull(observed, sessions, [1, 2, 3], random).p <= 0.05) hits += 1;
    }
    // Binomial: .05 ± 3.3 standard errors of .0097.
    expect(Math.abs(hits / 500 - 0.05)).toBeLessThan(0.032);
  });
  it('refuses shapes that disagree', () => {
    expect(() => combinedNull([1], [], [1], stream(5))).toThrow(/null distributions/);
    expect(() => combinedNull([1], [[0.1]], [0], stream(5))).toThrow(/shares/);
    expect(() => combinedNull([1], [[]], [1], stream(5))).toThrow(/no null draws/);
  });
});

describe('transformed estimates, prevalence and reliability: stated outcomes', () => {
  it('z by the delta method agrees with a small step', () => {
    const step = 1e-6;
    const z = fisherZDelta(0.4, 0.1);
    expect(Math.sqrt(z?.variance ?? NaN)).toBeCloseTo(
      (0.1 * (Math.atanh(0.4 + step) - Math.atanh(0.4 - step))) / (2 * step),
      8,
    );
    const ratio = logErrorRatioDelta(-0.3, 0.1);
    expect(ratio?.estimate).toBeCloseTo(-0.5 * Math.log(1.3), 12);
    expect(Math.sqrt(ratio?.variance ?? NaN)).toBeCloseTo(0.1 / 2.6, 12);
    expect(fisherZDelta(1, 0.1)).toBeNull();
    expect(logErrorRatioDelta(1, 0.1)).toBeNull();
    expect(() => fisherZDelta(1.2, 0.1)).toThrow(/correlation/);
  });
  it('prevalence stays within 0 and 1 and refuses impossible counts', () => {
    expect(prevalence(0, 20)).toMatchObject({ estimate: 0, interval: { low: 0 } });
    expect(prevalence(20, 20)).toMatchObject({ estimate: 1, interval: { high: 1 } });
    expect(() => prevalence(3, 2)).toThrow(/count of sessions/);
  });
  it('reliability needs repeats, allows unequal groups, and is 1 for exact repeats', () => {
    expect(repeatReliability([1, 2, 3], [0, 1, 2])).toBeNull();
    expect(repeatReliability([2, 2, 2, 2], [0, 0, 1, 1])).toBeNull();
    expect(repeatReliability([1, 1, 2, 2, 2], [0, 0, 1, 1, 1])).toMatchObject({ icc: 1, varianceWithin: 0 });
    // By hand: groups (0, 2) and (4, 6, 8), alone: 9. MSB = 30, MSW = 10/3, n₀ = 5 − 13/5 = 2.4.
    const result = repeatReliability([0, 2, 4, 6, 8, 9], [0, 0, 1, 1, 1, 2]);
    expect(result?.repeats).toBeCloseTo(2.4, 12);
    expect(result?.icc).toBeCloseTo((30 - 10 / 3) / (30 + 1.4 * (10 / 3)), 12);
    expect(designEffect(10, -0.5)).toBeNull();
  });
});
