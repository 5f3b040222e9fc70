import { describe, expect, it } from 'vitest';
import { applyNuisance } from '@/lib/engine/nuisance/apply-nuisance';
import { fitNuisance } from '@/lib/engine/nuisance/fit-nuisance';
import type { NuisanceVariable } from '@/lib/engine/readout/types';

const train = Int32Array.from({ length: 40 }, (_, i) => i);
const variable = (
  term: NuisanceVariable['term'],
  values: number[],
  periodDeg?: number,
): NuisanceVariable => ({
  name: 'speed',
  term,
  values: Float64Array.from(values),
  ...(periodDeg === undefined ? {} : { periodDeg }),
});
const ramp = Array.from({ length: 50 }, (_, i) => i ** 1.3);

function columns(v: NuisanceVariable, trials: ArrayLike<number>): number[][] {
  const { matrix, nRows, nColumns } = applyNuisance(fitNuisance([v], train), [v], trials);
  return Array.from({ length: nRows }, (_, i) =>
    Array.from(matrix.subarray(i * nColumns, (i + 1) * nColumns)),
  );
}

describe('nuisance designs', () => {
  it('linear is z by the training rows, for held-out rows too', () => {
    const v = variable('linear', ramp);
    const centre = ramp.slice(0, 40).reduce((a, b) => a + b) / 40;
    const sd = Math.sqrt(ramp.slice(0, 40).reduce((a, b) => a + (b - centre) ** 2, 0) / 40);
    expect(columns(v, [45])[0][0]).toBeCloseTo((ramp[45] - centre) / sd, 12);
  });

  it('changing held-out values changes nothing that was learnt', () => {
    for (const term of ['linear', 'quadratic', 'spline', 'category'] as const) {
      const values = term === 'category' ? ramp.map((_, i) => i % 3) : ramp;
      const altered = values.map((x, i) => (i < 40 ? x : x + 1000));
      expect(fitNuisance([variable(term, altered)], train)).toEqual(
        fitNuisance([variable(term, values)], train),
      );
    }
  });

  it('every column has training mean 0', () => {
    for (const term of ['linear', 'quadratic', 'spline', 'category'] as const) {
      const values = term === 'category' ? ramp.map((_, i) => (i * 7) % 4) : ramp;
      const rows = columns(variable(term, values), train);
      for (let j = 0; j < rows[0].length; j += 1) {
        expect(rows.reduce((sum, row) => sum + row[j], 0)).toBeCloseTo(0, 9);
      }
    }
  });

  it('quadratic has two columns, spline four, category one less than its levels, circular two', () => {
    expect(fitNuisance([variable('quadratic', ramp)], train).columnNames).toEqual(['speed', 'speed²']);
    expect(fitNuisance([variable('spline', ramp)], train).nColumns).toBe(4);
    expect(
      fitNuisance(
        [
          variable(
            'category',
            ramp.map((_, i) => i % 3),
          ),
        ],
        train,
      ).nColumns,
    ).toBe(2);
    expect(fitNuisance([variable('linear', ramp, 360)], train).columnNames).toEqual([
      'speed (cos)',
      'speed (sin)',
    ]);
  });

  it('the natural spline is linear beyond the training values and has no kink at a knot', () => {
    // Source: the definition of a natural cubic spline (second derivative 0 outside; two continuous derivatives).
    const grid = Array.from({ length: 4001 }, (_, i) => (i - 1000) / 1000); // −1 … 3; training values 0 … 2
    const training = Array.from({ length: 40 }, (_, i) => (2 * (i / 39)) ** 1.5 / 2 ** 0.5);
    const v = variable('spline', [...training, ...grid]);
    const design = fitNuisance([v], train);
    const at = applyNuisance(
      design,
      [v],
      Int32Array.from(grid, (_, i) => 40 + i),
    ).matrix;
    for (let j = 0; j < 4; j += 1) {
      const second = (i: number): number =>
        (at[(i - 1) * 4 + j] - 2 * at[i * 4 + j] + at[(i + 1) * 4 + j]) * 1e6;
      for (const i of [2, 500, 998, 3002, 3500, 3998]) expect(Math.abs(second(i))).toBeLessThan(1e-6);
      let largestJump = 0;
      for (let i = 2; i < 3999; i += 1)
        largestJump = Math.max(largestJump, Math.abs(second(i) - second(i - 1)));
      // A third derivative of at most ~100 at steps of .001: no jump in the second derivative.
      expect(largestJump).toBeLessThan(0.5);
    }
  });

  it('spans every natural spline on its knots: least squares reproduces one', () => {
    // f = Σ aₖ(x − k)₊³ over knots 0, ¼, ½, ¾ is natural on 0…1 when its second derivative at 1, 6Σ aₖ(1 − k), is 0:
    // ¼·1 + 1·¾ − 3·½ + 2·¼ = 0. (x = i/39 has its quartiles exactly there.)
    const x = Array.from({ length: 40 }, (_, i) => i / 39);
    const cube = (u: number): number => Math.max(0, u) ** 3;
    const f = x.map((u) => 0.25 * cube(u) + cube(u - 0.25) - 3 * cube(u - 0.5) + 2 * cube(u - 0.75));
    expect(leastSquaresResidual(columns(variable('spline', x), train), f)).toBeLessThan(1e-12);
    const bent = x.map((u) => cube(u));
    expect(leastSquaresResidual(columns(variable('spline', x), train), bent)).toBeGreaterThan(1e-4);
  });

  it('codes an unseen level as the training average and names it', () => {
    const v = variable(
      'category',
      ramp.map((_, i) => (i < 40 ? i % 2 : 5)),
    );
    const { matrix, unseen } = applyNuisance(fitNuisance([v], train), [v], [0, 1, 44]);
    expect(Array.from(matrix)).toEqual([-0.5, 0.5, 0]);
    expect(unseen).toEqual([{ variable: 'speed', trial: 44, level: 5 }]);
  });

  it('a variable that does not vary in training adds no column and is named', () => {
    for (const term of ['linear', 'quadratic', 'spline', 'category'] as const) {
      const design = fitNuisance(
        [
          variable(
            term,
            ramp.map((x, i) => (i < 40 ? 0.1 : x)),
          ),
        ],
        train,
      );
      expect(design).toMatchObject({ nColumns: 0, constant: ['speed'] });
    }
  });

  it('ties leave the spline fewer columns, never a division by zero', () => {
    const binary = variable(
      'spline',
      ramp.map((_, i) => i % 2),
    );
    const rows = columns(binary, [0, 1]);
    expect(rows.flat().every(Number.isFinite)).toBe(true);
    expect(rows[0].length).toBeLessThan(4);
  });

  it('circular columns do not jump where the angle wraps', () => {
    const v = variable(
      'linear',
      ramp.map((_, i) => (i === 0 ? 0.001 : i === 1 ? 359.999 : i * 7)),
      360,
    );
    const [first, second] = columns(v, [0, 1]);
    expect(first[0]).toBeCloseTo(second[0], 6);
    expect(first[1]).toBeCloseTo(second[1], 4);
  });

  it('refuses missing values with trial and column, and other variables than those fitted', () => {
    const v = variable('linear', ramp);
    const design = fitNuisance([v], train);
    expect(() => applyNuisance(design, [v], [70])).toThrow(/speed has no value at trial 71/);
    expect(() => applyNuisance(design, [{ ...v, name: 'contrast' }], [1])).toThrow(/contrast/);
    expect(() => applyNuisance(design, [], [1])).toThrow(/1 nuisance/);
    expect(() => fitNuisance([v], [])).toThrow(/training trial/);
    expect(() => fitNuisance([variable('linear', ramp, 0)], train)).toThrow(/period/);
  });
});

/** Largest residual of a least-squares fit with intercept, by modified Gram–Schmidt. */
function leastSquaresResidual(rows: number[][], y: number[]): number {
  const basis = [rows.map(() => 1), ...rows[0].map((_, j) => rows.map((row) => row[j]))].map((c) => [...c]);
  const rest = [...y];
  const dot = (a: number[], b: number[]): number => a.reduce((sum, x, i) => sum + x * b[i], 0);
  basis.forEach((column, j) => {
    for (let repeat = 0; repeat < 2; repeat += 1) {
      for (const other of basis.slice(0, j)) {
        const share = dot(column, other);
        column.forEach((_, i) => (column[i] -= share * other[i]));
      }
    }
    const size = Math.sqrt(dot(column, column));
    column.forEach((_, i) => (column[i] /= size));
    const share = dot(rest, column);
    rest.forEach((_, i) => (rest[i] -= share * column[i]));
  });
  return Math.max(...rest.map(Math.abs));
}
