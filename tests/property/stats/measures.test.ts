import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bcaLimits } from '@/lib/engine/measures/bca-limits';
import { benjaminiHochberg } from '@/lib/engine/measures/benjamini-hochberg';
import { calibration } from '@/lib/engine/measures/calibration';
import { heldOutR2 } from '@/lib/engine/measures/held-out-r2';
import { holm } from '@/lib/engine/measures/holm';
import { mae } from '@/lib/engine/measures/mae';
import { midranks } from '@/lib/engine/measures/midranks';
import { pearson } from '@/lib/engine/measures/pearson';
import { perLevel } from '@/lib/engine/measures/per-level';
import { quantiles } from '@/lib/engine/measures/quantiles';
import { rmse } from '@/lib/engine/measures/rmse';
import { spearman } from '@/lib/engine/measures/spearman';

// Source: identities that follow from the definitions.
const value = fc.integer({ min: -100_000, max: 100_000 }).map((x) => x / 100);
const pairs = fc.array(fc.tuple(value, value, value), { minLength: 3, maxLength: 60 });
const column = (rows: [number, number, number][], c: 0 | 1 | 2): number[] => rows.map((row) => row[c]);
const isFiniteOrNull = (x: number | null): boolean => x === null || Number.isFinite(x);
const pValues = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 40 });

describe('measures', () => {
  it('are finite or null for any finite input, the largest doubles included', () => {
    const any = fc.double({ noNaN: true, noDefaultInfinity: true });
    fc.assert(
      fc.property(fc.array(fc.tuple(any, any, any), { maxLength: 30 }), (rows) => {
        const [y, p, m] = [column(rows, 0), column(rows, 1), column(rows, 2)];
        const line = calibration(y, p);
        const all = [heldOutR2(y, p, m), pearson(y, p), spearman(y, p), rmse(y, p), mae(y, p)];
        expect([...all, line && line.slope, line && line.intercept].every(isFiniteOrNull)).toBe(true);
      }),
    );
  });

  it('R² and r do not change with the order of trials or the label’s unit', () => {
    fc.assert(
      fc.property(
        pairs,
        fc.integer({ min: 1, max: 50 }),
        fc.integer({ min: -9, max: 9 }),
        (rows, scale, shift) => {
          const [y, p, m] = [column(rows, 0), column(rows, 1), column(rows, 2)];
          const move = (x: number): number => scale * x + shift;
          const r2 = heldOutR2(y, p, m);
          const moved = heldOutR2(y.map(move), p.map(move), m.map(move));
          const reversed = heldOutR2([...y].reverse(), [...p].reverse(), [...m].reverse());
          if (r2 === null || moved === null || Math.abs(r2) > 1e9) return;
          expect(Math.abs(moved - r2)).toBeLessThan(1e-6 * Math.max(1, Math.abs(r2)));
          expect(Math.abs((reversed ?? NaN) - r2)).toBeLessThan(1e-9 * Math.max(1, Math.abs(r2)));
        },
      ),
    );
  });

  it('correlations lie in [−1, 1], are symmetric, and turn with the sign of a variable', () => {
    fc.assert(
      fc.property(pairs, (rows) => {
        const [x, y] = [column(rows, 0), column(rows, 1)];
        for (const measure of [pearson, spearman]) {
          const r = measure(x, y);
          if (r === null) return;
          expect(Math.abs(r)).toBeLessThanOrEqual(1);
          expect(measure(y, x)).toBeCloseTo(r, 10);
          expect(
            measure(
              x.map((v) => -v),
              y,
            ),
          ).toBeCloseTo(-r, 10);
        }
      }),
    );
  });

  it('Spearman does not change under a rising function', () => {
    fc.assert(
      fc.property(pairs, (rows) => {
        const [x, y] = [column(rows, 0).map(Math.round), column(rows, 1)];
        expect(
          spearman(
            x.map((v) => v ** 3),
            y,
          ),
        ).toEqual(spearman(x, y));
      }),
    );
  });

  it('midranks sum to n(n + 1)/2', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 9 }), { maxLength: 50 }), (x) => {
        const n = x.length;
        expect(midranks(x).reduce((a, b) => a + b, 0)).toBeCloseTo((n * (n + 1)) / 2, 9);
      }),
    );
  });

  it('mean absolute error never exceeds the root mean squared one', () => {
    fc.assert(
      fc.property(pairs, (rows) => {
        const [y, p] = [column(rows, 0), column(rows, 1)];
        expect(mae(y, p) ?? 0).toBeLessThanOrEqual((rmse(y, p) ?? 0) * (1 + 1e-12));
      }),
    );
  });

  it('predictions put through their own calibration line are calibrated', () => {
    fc.assert(
      fc.property(pairs, (rows) => {
        const [y, p] = [column(rows, 0), column(rows, 1)];
        const line = calibration(y, p);
        if (line === null || Math.abs(line.slope) < 1e-6 || Math.abs(line.slope) > 1e6) return;
        const again = calibration(
          y,
          p.map((v) => line.intercept + line.slope * v),
        );
        expect(again?.slope).toBeCloseTo(1, 6);
      }),
    );
  });

  it('levels keep every trial once and average to the overall bias', () => {
    fc.assert(
      fc.property(pairs, fc.integer({ min: 0, max: 20 }), (rows, maxLevels) => {
        const [y, p] = [column(rows, 0), column(rows, 1)];
        const levels = perLevel(y, p, { maxLevels });
        const total = levels.reduce((sum, level) => sum + level.nTrials, 0);
        expect(total).toBe(y.length);
        const bias = levels.reduce((sum, level) => sum + level.nTrials * level.bias, 0) / total;
        const overall = y.reduce((sum, label, i) => sum + p[i] - label, 0) / total;
        expect(bias).toBeCloseTo(overall, 8);
        const order = levels.map((level) => level.level);
        expect([...order].sort((a, b) => a - b)).toEqual(order);
      }),
    );
  });

  it('quantiles rise with the probability and stay within the values', () => {
    fc.assert(
      fc.property(fc.array(value, { minLength: 1, maxLength: 40 }), (x) => {
        const q = quantiles(x, [0, 0.1, 0.5, 0.9, 1]) ?? [];
        expect(q[0]).toBe(Math.min(...x));
        expect(q[4]).toBe(Math.max(...x));
        for (let i = 1; i < 5; i += 1) expect(q[i]).toBeGreaterThanOrEqual(q[i - 1]);
      }),
    );
  });

  it('adjusted p values keep the order, are never below the raw ones, and Holm’s never below Benjamini–Hochberg’s', () => {
    fc.assert(
      fc.property(pValues, (p) => {
        const [bh, h] = [benjaminiHochberg(p), holm(p)];
        p.forEach((raw, i) => {
          expect(bh[i]).toBeGreaterThanOrEqual(raw * (1 - 1e-12));
          expect(h[i]).toBeGreaterThanOrEqual(bh[i] * (1 - 1e-12));
          expect(h[i]).toBeLessThanOrEqual(1);
          p.forEach((other, j) => {
            if (raw < other) {
              expect(bh[i]).toBeLessThanOrEqual(bh[j]);
              expect(h[i]).toBeLessThanOrEqual(h[j]);
            }
          });
        });
      }),
    );
  });

  it('BCa limits are replicates’ quantiles in the right order', () => {
    fc.assert(
      fc.property(
        fc.array(value, { minLength: 10, maxLength: 100 }),
        value,
        fc.double({ min: -0.5, max: 0.5, noNaN: true }),
        (replicates, observed, acceleration) => {
          const { low, high } = bcaLimits(observed, replicates, acceleration);
          expect(low).toBeGreaterThanOrEqual(Math.min(...replicates));
          expect(high).toBeLessThanOrEqual(Math.max(...replicates));
          expect(Number.isFinite(low) && Number.isFinite(high)).toBe(true);
        },
      ),
    );
  });
});
