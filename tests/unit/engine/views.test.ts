import { describe, expect, it } from 'vitest';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import { runReadout } from '@/lib/engine/readout/run-readout';
import type { ReadoutInput, ReadoutNumbers, ViewSpec } from '@/lib/engine/readout/types';
import { openNativeLinalg } from '@/lib/native/open-linalg';
import { makeInput } from '@/tests/unit/engine/make-input';

const linalg = openNativeLinalg() ?? portableLinalg;

function run(input: ReadoutInput, ...views: ViewSpec[]): ReadoutNumbers {
  const result = runReadout({ ...input, views }, linalg);
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  return result.numbers;
}
const base = (signal = 1, changes: Partial<ReadoutInput> = {}): ReadoutInput =>
  makeInput(
    { nTrials: 90, nUnits: 8, nBins: 4, signal },
    { nullScheme: { kind: 'free', draws: 39 }, ...changes },
  );

interface WindowRow {
  startMs: number;
  endMs: number;
  r2: number;
  p: number;
  pFamily: number;
}

describe('time course', () => {
  it('is the readout itself in a window of its own width', () => {
    const numbers = run(base(), { kind: 'timeCourse', widthMs: 100, stepMs: 25 });
    const [row] = numbers.views[0].windows as WindowRow[];
    expect(row).toMatchObject({ startMs: 0, endMs: 100, r2: numbers.heldOut.r2, p: numbers.null?.p });
  });

  it('slides in steps, and a family-wise p is never below the window’s own', () => {
    const numbers = run(base(0.3), { kind: 'timeCourse', widthMs: 50, stepMs: 25 });
    const rows = numbers.views[0].windows as WindowRow[];
    expect(rows.map(({ startMs }) => startMs)).toEqual([0, 25, 50]);
    for (const row of rows) expect(row.pFamily).toBeGreaterThanOrEqual(row.p);
  });

  it('refuses windows that are not made of whole bins', () => {
    const planned = planReadout({ ...base(), views: [{ kind: 'timeCourse', widthMs: 60, stepMs: 25 }] });
    expect(planned.ok ? [] : planned.problems.map(({ message }) => message)).toEqual([
      'Windows of 60 ms every 25 ms cannot be made of 4 bins of 25 ms.',
    ]);
  });
});

describe('temporal generalisation', () => {
  it('has the time course on its diagonal', () => {
    const windows = { widthMs: 25, stepMs: 25 };
    for (const estimator of [base().estimator, { kind: 'leastSquares' } as const]) {
      const { views } = run(
        base(1, { estimator }),
        { kind: 'timeCourse', ...windows },
        { kind: 'temporalGeneralisation', ...windows },
      );
      const course = (views[0].windows as WindowRow[]).map(({ r2 }) => r2);
      const matrix = views[1].r2 as number[][];
      course.forEach((r2, i) => expect(matrix[i][i]).toBeCloseTo(r2, 10));
    }
  });
  it('works in the dual form too', () => {
    const input = makeInput({ nTrials: 24, nUnits: 40, nBins: 2 }, { nullScheme: { kind: 'none' } });
    const windows = { widthMs: 25, stepMs: 25 };
    const { views } = run(
      input,
      { kind: 'timeCourse', ...windows },
      { kind: 'temporalGeneralisation', ...windows },
    );
    const matrix = views[1].r2 as number[][];
    (views[0].windows as WindowRow[]).forEach(({ r2 }, i) => expect(matrix[i][i]).toBeCloseTo(r2, 10));
  });
});

describe('population size and learning', () => {
  it('end at the readout itself', () => {
    const numbers = run(
      base(),
      { kind: 'populationSize', sizes: [2, 8, 99], draws: 4 },
      { kind: 'learning', sizes: [20, 72], draws: 3 },
    );
    const [population, learning] = numbers.views as unknown as {
      sizes: { size: number; mean: number; values: number[] }[];
      left: number[];
    }[];
    expect(population.left).toEqual([99]);
    expect(population.sizes[1].size).toBe(8);
    for (const value of population.sizes[1].values) expect(value).toBeCloseTo(numbers.heldOut.r2 ?? NaN, 12);
    expect(population.sizes[0].mean).toBeLessThan(numbers.heldOut.r2 ?? NaN);
    expect(new Set(population.sizes[0].values).size).toBeGreaterThan(1);
    expect(learning.sizes[1].mean).toBeCloseTo(numbers.heldOut.r2 ?? NaN, 12);
    expect(learning.sizes[0].mean).toBeLessThan(numbers.heldOut.r2 ?? NaN);
  });
});

describe('single units', () => {
  it('are readouts of one unit each', () => {
    const numbers = run(base(), { kind: 'singleUnits' });
    const rows = numbers.views[0].units as {
      unit: number;
      r2: number;
      p: number;
      q: number;
      pFamily: number;
    }[];
    expect(rows).toHaveLength(8);
    const alone = run({ ...base(), unitIndex: Int32Array.of(3) });
    expect(rows[3].r2).toBeCloseTo(alone.heldOut.r2 ?? NaN, 12);
    expect(rows[3].p).toBe(alone.null?.p);
    for (const { p, q, pFamily } of rows) {
      expect(q).toBeGreaterThanOrEqual(p);
      expect(pFamily).toBeGreaterThanOrEqual(p);
    }
  });
});

describe('weights and patterns', () => {
  it('are the same in primal and dual form and agree over folds under a strong signal', () => {
    const input = base(1, { estimator: { kind: 'ridge', penalty: { value: 5 } } });
    const view = run(input, { kind: 'weights' }).views[0] as unknown as Record<
      'weights' | 'pattern',
      { mean: number[]; agreement: number }
    >;
    expect(view.weights.agreement).toBeGreaterThan(0.8);
    const wide = makeInput(
      { nTrials: 20, nUnits: 30 },
      { estimator: { kind: 'ridge', penalty: { value: 5 } }, nullScheme: { kind: 'none' } },
    );
    const dual = run(wide, { kind: 'weights' }).views[0] as unknown as Record<'weights', { mean: number[] }>;
    const svd = run({ ...wide, estimator: { kind: 'ridge', penalty: { value: 1e-9 } } }, { kind: 'weights' })
      .views[0] as unknown as Record<'weights', { mean: number[] }>;
    expect(dual.weights.mean).toHaveLength(30);
    expect(svd.weights.mean.some((w) => w !== 0)).toBe(true);
  });

  it('give the pattern of two channels where the second only carries noise (Haufe et al. 2014: filter (1, −1), pattern (1, 0))', () => {
    // x₁ = s + d, x₂ = d in whole counts: least squares finds s = x₁ − x₂ exactly.
    const input = makeInput(
      { nTrials: 48, nUnits: 2, nBins: 1 },
      {
        estimator: { kind: 'leastSquares' },
        nullScheme: { kind: 'none' },
        binWidthMs: 1000,
        window: { startMs: 0, endMs: 1000 },
      },
    );
    const s = Array.from({ length: 48 }, (_, i) => i % 4);
    const d = Array.from({ length: 48 }, (_, i) => Math.floor(i / 4) % 4);
    const counts = new Int32Array(96);
    s.forEach((value, t) => counts.set([value + d[t], d[t]], 2 * t));
    const view = run({ ...input, counts, y: Float64Array.from(s) }, { kind: 'weights' })
      .views[0] as unknown as Record<'weights' | 'pattern', { mean: number[] }>;
    expect(view.weights.mean[0]).toBeCloseTo(1, 10);
    expect(view.weights.mean[1]).toBeCloseTo(-1, 10);
    expect(view.pattern.mean[0]).toBeCloseTo(1, 1);
    expect(Math.abs(view.pattern.mean[1])).toBeLessThan(0.1);
  });
});
