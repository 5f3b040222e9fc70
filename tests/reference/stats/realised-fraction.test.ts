import { describe, expect, it } from 'vitest';
import type { Centring } from '@/lib/engine/label/centring';
import { realisedFractions, type RealisedFractions } from '@/lib/engine/label/realised-fractions';
import { randomSource } from '@/lib/engine/random/random-source';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import { ouMotion } from '@/scripts/calibration/ou-motion';

// Source: simulation from the definition itself. Ornstein–Uhlenbeck motion sampled exactly (Gillespie 1996), whose
// shared share of variance is known; 5 locations, 2 axes, 12 frames of 25 ms, τ 0.1 s, 2,000 trials.
const shape = { nLocations: 5, nAxes: 2, nFrames: 12 };
const nTrials = 2000;

function simulate(fraction: number, driftSd: number, centring: Centring): RealisedFractions {
  const random = randomSource(splitGenerator(11, 'ou', Math.round(10 * fraction), driftSd));
  const size = 5 * 2 * 12;
  const velocity = new Float64Array(nTrials * size);
  for (let i = 0; i < nTrials; i += 1) {
    const motion = { fraction, ...shape, frameS: 0.025, tauS: 0.1, driftSd };
    velocity.set(ouMotion(random, motion), i * size);
  }
  return realisedFractions(velocity, nTrials, shape, { centring });
}

function meanOf(result: RealisedFractions): number {
  return result.trials.reduce((sum, trial) => sum + (trial?.fraction ?? NaN), 0) / nTrials;
}

function coverageOf(result: RealisedFractions, truth: number): number {
  const covered = result.trials.filter(
    (trial) => trial?.interval && trial.interval.low <= truth && truth <= trial.interval.high,
  );
  return covered.length / nTrials;
}

describe('realised fraction on simulated motion of known shared variance', () => {
  for (const driftSd of [0, 2]) {
    for (const fraction of [0, 0.2, 0.4, 0.6, 0.8]) {
      it(`location centring finds ${fraction}, common drift ${driftSd}`, () => {
        const result = simulate(fraction, driftSd, 'location');
        expect(Math.abs((result.pooled ?? NaN) - fraction)).toBeLessThan(0.01);
        expect(Math.abs(meanOf(result) - fraction)).toBeLessThan(0.04);
        const coverage = coverageOf(result, fraction);
        expect(coverage).toBeGreaterThan(0.9);
        expect(coverage).toBeLessThan(0.97);
      });
    }
  }

  it('axis centring is biased low in short scenes by the amount known beforehand', () => {
    // Source: mean-removal algebra. E of the shared and own mean squares under axis centring, from the variance of a
    // T-frame mean of the process, g = Var(mean)/Var: (f(1 − g) − (1 − f) g/L) / (f(1 − g) + (1 − f)(1 − g/L)).
    const phi = Math.exp(-0.25);
    let g = 0;
    for (let s = 0; s < 12; s += 1) for (let t = 0; t < 12; t += 1) g += phi ** Math.abs(s - t) / 144;
    for (const fraction of [0.2, 0.4, 0.6]) {
      const shared = fraction + (1 - fraction) / 5;
      const between = (5 * shared * (1 - g) * 12) / 11;
      const within = 1 - fraction;
      const expected = (between - within) / (between + 4 * within);
      const { pooled } = simulate(fraction, 0, 'axis');
      expect(Math.abs((pooled ?? NaN) - expected)).toBeLessThan(0.015);
      expect(pooled).toBeLessThan(fraction - 0.1);
    }
  });

  it('no centring counts a constant common drift as shared', () => {
    expect(simulate(0.4, 0, 'none').pooled).toBeCloseTo(0.4, 1);
    // With drift variance 4 the shared share is (0.4 + 4)/5.
    expect(Math.abs((simulate(0.4, 2, 'none').pooled ?? NaN) - 4.4 / 5)).toBeLessThan(0.01);
  });
});
