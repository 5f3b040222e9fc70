import { describe, expect, it } from 'vitest';
import { fisherZPower } from '@/lib/engine/plan/fisher-z-power';
import { fisherZSampleSize } from '@/lib/engine/plan/fisher-z-sample-size';
import { fitInversePower } from '@/lib/engine/plan/fit-inverse-power';
import { inversePowerAt } from '@/lib/engine/plan/inverse-power';
import { planFromPilot, type Pilot } from '@/lib/engine/plan/plan-from-pilot';
import { randomSource } from '@/lib/engine/random/random-source';
import { splitGenerator } from '@/lib/engine/random/split-generator';

const stream = (...indices: number[]): ReturnType<typeof randomSource> =>
  randomSource(splitGenerator(2, 'plan', ...indices));

describe('inverse-power learning curve', () => {
  it('finds the curve that made the scores', () => {
    const sizes = [40, 60, 90, 140, 200, 300];
    const curve = fitInversePower(
      sizes,
      sizes.map((s) => 0.6 - 4 * s ** -0.8),
    );
    expect(curve.asymptote).toBeCloseTo(0.6, 6);
    expect(curve.drop).toBeCloseTo(4, 4);
    expect(curve.rate).toBeCloseTo(0.8, 6);
    expect(inversePowerAt(curve, 1000)).toBeCloseTo(0.6 - 4 * 1000 ** -0.8, 6);
  });
  it('is flat where nothing is gained, and never promises more than 1', () => {
    expect(fitInversePower([10, 20, 40], [0.3, 0.2, 0.1])).toMatchObject({ isFlat: true, drop: 0 });
    const steep = fitInversePower([10, 20, 40], [0.1, 0.5, 0.95]);
    expect(steep.asymptote).toBeLessThanOrEqual(1);
    expect(inversePowerAt(steep, 1e9)).toBeLessThanOrEqual(1);
  });
  it('does not depend on the unit of size', () => {
    const scores = [0.05, 0.12, 0.2, 0.22];
    const one = fitInversePower([50, 100, 200, 400], scores);
    const other = fitInversePower([5e5, 1e6, 2e6, 4e6], scores);
    expect(other.asymptote).toBeCloseTo(one.asymptote, 8);
    expect(other.rate).toBeCloseTo(one.rate, 8);
  });
  it('refuses two sizes and sizes that are not positive', () => {
    expect(() => fitInversePower([10, 20, 20], [0, 1, 1])).toThrow(/3 different sizes/);
    expect(() => fitInversePower([0, 1, 2], [0, 1, 1])).toThrow(/not positive/);
  });
});

describe('plan from a pilot', () => {
  function pilotOf(asymptote: number, seed: number, extra: Partial<Pilot> = {}): Pilot {
    const random = stream(seed);
    const sizes = [40, 60, 90, 130];
    const r2 = sizes.map((s) =>
      Array.from({ length: 40 }, () => asymptote - 2 * s ** -1 + 0.03 * random.normal()),
    );
    return { vary: 'trials', sizes, r2, ...extra };
  }
  it('finds the number of trials that the true curve needs', () => {
    // Source: the simulation's own curve R² = .1 − 2/n, put through the published power formula.
    const truth = Array.from({ length: 2000 }, (_, n) => n + 4).find(
      (n) => fisherZPower(Math.sqrt(Math.max(0, 0.1 - 2 / n)), n, 0.05, 1) >= 0.8,
    );
    const { needed, neededRange, reached } = planFromPilot(pilotOf(0.1, 1), stream(2));
    expect(Math.abs((needed ?? 0) / (truth ?? 1) - 1)).toBeLessThan(0.3);
    expect(neededRange?.low).toBeLessThanOrEqual(needed ?? 0);
    expect(neededRange?.high).toBeGreaterThanOrEqual(needed ?? Infinity);
    expect(reached).toBeGreaterThan(0.5);
  });
  it('asks for more trials when they depend on one another', () => {
    const free = planFromPilot(pilotOf(0.1, 3), stream(4)).needed ?? NaN;
    const dependent = planFromPilot(pilotOf(0.1, 3, { independentShare: 0.5 }), stream(4)).needed ?? NaN;
    expect(dependent).toBeGreaterThan(free);
  });
  it('promises nothing without a signal, whatever the size', () => {
    const plan = planFromPilot(pilotOf(-0.05, 5), stream(6));
    expect(plan).toMatchObject({ needed: null, neededRange: null });
    expect(plan.points.every((point) => Number.isFinite(point.power))).toBe(true);
  });
  it('plans units at the pilot’s trials', () => {
    const plan = planFromPilot(pilotOf(0.2, 7, { vary: 'units', nTrials: 100 }), stream(8));
    const at = (size: number): number =>
      fisherZPower(Math.sqrt(Math.max(0, inversePowerAt(plan.curve, size))), 100, 0.05, 1);
    expect(at(plan.needed ?? NaN)).toBeGreaterThanOrEqual(0.8);
    expect(at((plan.needed ?? NaN) - 1)).toBeLessThan(0.8);
    expect(() => planFromPilot(pilotOf(0.2, 7, { vary: 'units' }), stream(8))).toThrow(/number of trials/);
  });
});

describe('Fisher-z planning: stated outcomes', () => {
  it('refuses no correlation and holds the ends', () => {
    expect(() => fisherZSampleSize(0)).toThrow(/between 0 and 1/);
    expect(() => fisherZSampleSize(1e-200)).toThrow(/too small/);
    expect(fisherZSampleSize(0.999999).n).toBe(4);
    expect(fisherZPower(0.5, 3)).toBe(0);
    expect(fisherZPower(1, 10)).toBe(1);
    expect(fisherZPower(-1, 10, 0.05, 1)).toBe(0);
  });
});
