import { describe, expect, it } from 'vitest';
import { EngineError } from '@/lib/engine/engine-error';
import { intraclassCorrelation } from '@/lib/engine/label/intraclass-correlation';
import { nominalFractions } from '@/lib/engine/label/nominal-fractions';
import { realisedFraction } from '@/lib/engine/label/realised-fraction';
import { realisedFractions } from '@/lib/engine/label/realised-fractions';
import { stimulusCeiling } from '@/lib/engine/label/stimulus-ceiling';
import { transformLabels } from '@/lib/engine/label/transform-labels';

const shape = { nLocations: 3, nAxes: 2, nFrames: 4 };
const wave = Float64Array.from({ length: 24 }, (_, c) => Math.sin(5 * c) + (c % 3));

describe('realised fraction: stated outcomes', () => {
  it('is null where nothing moves: all zero, or constant velocities under location centring', () => {
    expect(realisedFraction(new Float64Array(24), shape)).toBeNull();
    const constant = Float64Array.from({ length: 24 }, (_, c) => 0.1 * Math.floor(c / 4));
    expect(realisedFraction(constant, shape)).toBeNull();
    expect(realisedFraction(constant, shape, { centring: 'none' })).not.toBeNull();
  });

  it('is 1 with a closed interval where all locations move alike', () => {
    const one = Float64Array.from({ length: 24 }, (_, c) => Math.round(Math.sin(c % 8) * 8));
    const result = realisedFraction(one, shape, { centring: 'none' });
    expect(result).toMatchObject({ fraction: 1, clipped: 1, ownVariance: 0 });
    expect(result?.interval).toMatchObject({ low: 1, high: 1 });
  });

  it('keeps the raw negative value beside the clipped one', () => {
    const opposed = Float64Array.from(
      { length: 24 },
      (_, c) => (Math.floor(c / 8) - 1) * Math.sin(3 * (c % 8)),
    );
    const result = realisedFraction(opposed, shape);
    expect(result?.fraction).toBeCloseTo(-0.5, 12); // −1/(L − 1)
    expect(result?.clipped).toBe(0);
  });

  it('common drift changes nothing under location centring, and does under none', () => {
    const drifting = wave.map((v) => v + 100);
    expect(realisedFraction(drifting, shape)?.fraction).toBeCloseTo(
      realisedFraction(wave, shape)?.fraction ?? NaN,
      9,
    );
    expect(realisedFraction(drifting, shape, { centring: 'none' })?.fraction).toBeGreaterThan(0.99);
  });

  it('refuses one location, one frame, short or non-finite velocities, with the trial', () => {
    expect(() => realisedFraction(wave, { ...shape, nLocations: 1 })).toThrow(/one location/);
    expect(() => realisedFraction(wave, { ...shape, nFrames: 1 })).toThrow(/one frame/);
    expect(() => realisedFraction(wave.subarray(1), shape)).toThrow(EngineError);
    const two = new Float64Array(48).fill(1);
    two[30] = NaN;
    try {
      realisedFractions(two, 2, shape);
      expect.unreachable('it was accepted');
    } catch (error) {
      expect((error as EngineError).place.trial).toBe(1);
    }
  });

  it('pools variances, not fractions, and leaves out trials without motion', () => {
    const session = new Float64Array(72);
    session.set(wave, 0);
    session.set(
      wave.map((v, c) => 3 * v * ((c % 5) - 2)),
      48,
    );
    const { trials, pooled } = realisedFractions(session, 3, shape);
    expect(trials[1]).toBeNull();
    const parts = [trials[0], trials[2]];
    const shared = parts.reduce((sum, t) => sum + (t?.sharedVariance ?? NaN), 0);
    const own = parts.reduce((sum, t) => sum + (t?.ownVariance ?? NaN), 0);
    expect(pooled).toBeCloseTo(shared / (shared + own), 12);
    expect(realisedFractions(new Float64Array(24), 1, shape).pooled).toBeNull();
  });
});

describe('labels from strengths and their transforms', () => {
  it('nominal fraction is the shared share of squared strengths', () => {
    const out = nominalFractions([0, 3, 1, 1e200, 0], [1, 4, 0, 1e200, 0]);
    expect(out).toEqual([0, 9 / 25, 1, 0.5, null]);
  });
  it('stimulus ceiling is a squared correlation', () => {
    expect(stimulusCeiling([0, 0, 1, 1], [0, 1, 1, 2])).toBeCloseTo(0.5, 12);
    expect(stimulusCeiling([1, 1], [0, 1])).toBeNull();
  });
  it('log and logit, with the values they refuse', () => {
    expect(Array.from(transformLabels([1, Math.E], { kind: 'log' }))).toEqual([0, 1]);
    const out = transformLabels([0, 0.5, 1], { kind: 'logit', epsilon: 0.01 });
    expect(out[1]).toBe(0);
    expect(out[0]).toBeCloseTo(Math.log(0.01 / 0.99), 12);
    expect(out[2]).toBeCloseTo(-out[0], 12);
    expect(() => transformLabels([1, 0], { kind: 'log' })).toThrow(/trial 2/);
    expect(() => transformLabels([1.2], { kind: 'logit', epsilon: 0.01 })).toThrow(/logit/);
    expect(() => transformLabels([0.2], { kind: 'logit', epsilon: 0 })).toThrow(/ε/);
  });
  it('an intraclass correlation of what does not vary is null', () => {
    expect(intraclassCorrelation(new Array(12).fill(0.1), 3, 4)).toBeNull();
    expect(() => intraclassCorrelation([1, 2], 1, 2)).toThrow(/at least 2/);
  });
});
