import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { combineSessions } from '@/lib/engine/group/combine-sessions';
import { randomEffectsMean } from '@/lib/engine/group/random-effects-mean';
import type { Centring } from '@/lib/engine/label/centring';
import { realisedFraction } from '@/lib/engine/label/realised-fraction';
import { applyNuisance } from '@/lib/engine/nuisance/apply-nuisance';
import { fitNuisance } from '@/lib/engine/nuisance/fit-nuisance';
import type { NuisanceVariable } from '@/lib/engine/readout/types';

// Source: identities that follow from the definitions.
const shape = { nLocations: 3, nAxes: 2, nFrames: 5 };
const velocity = fc.array(fc.integer({ min: -50, max: 50 }), { minLength: 30, maxLength: 30 });
const centring = fc.constantFrom<Centring>('location', 'axis', 'none');

describe('realised fraction', () => {
  it('lies in [−1/(L − 1), 1] and does not change with the unit of speed', () => {
    fc.assert(
      fc.property(velocity, centring, fc.integer({ min: 1, max: 1000 }), (v, how, scale) => {
        const one = realisedFraction(v, shape, { centring: how });
        const other = realisedFraction(
          v.map((x) => x * scale),
          shape,
          { centring: how },
        );
        expect(other === null).toBe(one === null);
        if (one === null || other === null) return;
        expect(one.fraction).toBeGreaterThanOrEqual(-0.5 - 1e-12);
        expect(one.fraction).toBeLessThanOrEqual(1);
        expect(other.fraction).toBeCloseTo(one.fraction, 9);
        expect(one.interval === null || Number.isFinite(one.interval.low + one.interval.high)).toBe(true);
      }),
    );
  });
  it('does not change when locations swap places', () => {
    fc.assert(
      fc.property(velocity, centring, (v, how) => {
        const swapped = [...v.slice(20, 30), ...v.slice(10, 20), ...v.slice(0, 10)];
        const one = realisedFraction(v, shape, { centring: how });
        const other = realisedFraction(swapped, shape, { centring: how });
        if (one === null || other === null) return;
        expect(other.fraction).toBeCloseTo(one.fraction, 9);
      }),
    );
  });
});

const sessions = fc.array(
  fc.record({
    animal: fc.constantFrom('a', 'b', 'c', 'd'),
    estimate: fc.double({ min: -2, max: 1, noNaN: true }),
    variance: fc.double({ min: 1e-6, max: 10, noNaN: true }),
  }),
  { minLength: 1, maxLength: 12 },
);

describe('many sessions', () => {
  it('shares sum to 1, the mean lies among the estimates, nothing is NaN', () => {
    fc.assert(
      fc.property(sessions, (list) => {
        const { overall, sessionShares, animals } = combineSessions(list);
        expect(sessionShares.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 9);
        if (animals.length === 1) expect(overall).toBeNull();
        if (overall === null) return;
        const estimates = list.map((session) => session.estimate);
        expect(overall.mean).toBeGreaterThanOrEqual(Math.min(...estimates) - 1e-9);
        expect(overall.mean).toBeLessThanOrEqual(Math.max(...estimates) + 1e-9);
        expect(overall.standardErrorFloored).toBeGreaterThanOrEqual(overall.standardErrorUnfloored);
        expect(Number.isFinite(overall.tau2) && overall.i2 >= 0 && overall.i2 < 1).toBe(true);
        expect(
          overall.predictionInterval === null || overall.predictionInterval.low <= overall.interval.low + 1,
        ).toBe(true);
      }),
    );
  });
  it('the order of sessions does not matter, a shift moves the mean, a scale scales it', () => {
    fc.assert(
      fc.property(
        sessions.filter((list) => list.length > 1),
        (list) => {
          const y = list.map((session) => session.estimate);
          const v = list.map((session) => session.variance);
          const base = randomEffectsMean(y, v);
          const back = randomEffectsMean([...y].reverse(), [...v].reverse());
          const moved = randomEffectsMean(
            y.map((x) => x + 5),
            v,
          );
          const scaled = randomEffectsMean(
            y.map((x) => 10 * x),
            v.map((x) => 100 * x),
          );
          expect(back.mean).toBeCloseTo(base.mean, 6);
          expect(moved.mean).toBeCloseTo(base.mean + 5, 6);
          expect(scaled.mean).toBeCloseTo(10 * base.mean, 5);
          expect(scaled.i2).toBeCloseTo(base.i2, 5);
        },
      ),
    );
  });
});

describe('nuisance designs', () => {
  const term = fc.constantFrom<NuisanceVariable['term']>('linear', 'quadratic', 'spline', 'category');
  it('no held-out value changes what training rows look like', () => {
    fc.assert(
      fc.property(
        term,
        fc.array(fc.integer({ min: 0, max: 6 }), { minLength: 12, maxLength: 30 }),
        fc.array(fc.integer({ min: -99, max: 99 }), { minLength: 4, maxLength: 4 }),
        (how, values, held) => {
          const train = Int32Array.from(values, (_, i) => i);
          const build = (tail: number[]): Float64Array => {
            const variables = [{ name: 'x', term: how, values: Float64Array.from([...values, ...tail]) }];
            const rows = applyNuisance(fitNuisance(variables, train), variables, train);
            expect(rows.matrix.every(Number.isFinite)).toBe(true);
            return rows.matrix;
          };
          expect(build(held)).toEqual(build([0, 0, 0, 0]));
        },
      ),
    );
  });
  it('a linear, quadratic or spline design does not depend on the unit of the variable', () => {
    fc.assert(
      fc.property(
        fc.constantFrom<NuisanceVariable['term']>('linear', 'quadratic', 'spline'),
        fc.array(fc.integer({ min: 0, max: 1000 }), { minLength: 12, maxLength: 30 }),
        (how, values) => {
          const train = Int32Array.from(values, (_, i) => i);
          const build = (scale: number): Float64Array => {
            const variables = [{ name: 'x', term: how, values: Float64Array.from(values, (x) => x * scale) }];
            return applyNuisance(fitNuisance(variables, train), variables, train).matrix;
          };
          const [one, other] = [build(1), build(64)];
          expect(other.length).toBe(one.length);
          one.forEach((x, i) => expect(other[i]).toBeCloseTo(x, 9));
        },
      ),
    );
  });
});
