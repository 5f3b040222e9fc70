import { describe, expect, it } from 'vitest';
import { labelSampler } from '@/lib/engine/controls/label-sampler';
import { planDraws } from '@/lib/engine/controls/plan-draws';
import type { NullSpec } from '@/lib/engine/readout/types';

const n = 12;
const trials = Int32Array.from({ length: n }, (_, i) => i);
const y = Float64Array.from({ length: n }, (_, i) => i);
const codes = trials.map((i) => Math.floor(i / 4));

function draw(scheme: NullSpec, values = y, b = 0): number[] {
  const out = new Float64Array(n);
  labelSampler(scheme, values, trials, 5)(b, out, 0);
  return Array.from(out);
}
const sorted = (values: number[]): number[] => [...values].sort((a, b) => a - b);

describe('shuffled labels', () => {
  it('free: every label once, another order each draw, the same order for the same draw', () => {
    const scheme: NullSpec = { kind: 'free', draws: 10 };
    expect(sorted(draw(scheme))).toEqual(Array.from(y));
    expect(draw(scheme)).not.toEqual(draw(scheme, y, 1));
    expect(draw(scheme, y, 7)).toEqual(draw(scheme, y, 7));
  });

  it('free: all orders of three labels are equally likely (χ² with 5 df below its .999 quantile, 20.5)', () => {
    const counts = new Map<string, number>();
    const sample = labelSampler(
      { kind: 'free', draws: 6000 },
      Float64Array.of(0, 1, 2),
      trials.slice(0, 3),
      5,
    );
    const out = new Float64Array(3);
    for (let b = 0; b < 6000; b++) {
      sample(b, out, 0);
      counts.set(out.join(), (counts.get(out.join()) ?? 0) + 1);
    }
    const chi2 = [...counts.values()].reduce((sum, count) => sum + (count - 1000) ** 2 / 1000, 0);
    expect(counts.size).toBe(6);
    expect(chi2).toBeLessThan(20.5);
  });

  it('within: labels stay in their level', () => {
    const out = draw({ kind: 'within', codes, draws: 1 });
    out.forEach((value, i) => expect(Math.floor(value / 4)).toBe(codes[i]));
    expect(out).not.toEqual(Array.from(y));
  });

  it('groups: sequences move whole; constant groups exchange their value', () => {
    for (let b = 0; b < 5; b++) {
      const out = draw({ kind: 'groups', codes, draws: 5 }, y, b);
      for (let g = 0; g < 3; g++) expect([0, 4, 8].map((s) => s + 3)).toContain(out[4 * g + 3]);
      for (let i = 0; i < n; i++) expect(out[i] % 4).toBe(i % 4);
    }
    const uneven = trials.map((i) => (i < 2 ? 0 : i < 7 ? 1 : 2));
    const constant = Float64Array.from(uneven, (code) => code * 10);
    const seen = new Set(
      Array.from({ length: 30 }, (_, b) =>
        draw({ kind: 'groups', codes: uneven, draws: 30 }, constant, b).join(),
      ),
    );
    expect(seen.size).toBe(6);
  });

  it('circularShift: each shift at most once', () => {
    const scheme: NullSpec = { kind: 'circularShift', draws: 11 };
    const firsts = Array.from({ length: 11 }, (_, b) => draw(scheme, y, b)[0]);
    expect(sorted(firsts)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11]);
    expect(planDraws({ kind: 'circularShift', draws: 1000 }, y, trials, n).nDraws).toBe(11);
  });

  it('given: y*[i] = y[perm[i]]', () => {
    const permutations = [Int32Array.from(trials).reverse()];
    expect(draw({ kind: 'given', permutations })).toEqual(Array.from(y).reverse());
  });

  it('sessions: the other session’s labels; refuses residuals', () => {
    const scheme: NullSpec = {
      kind: 'sessions',
      sequences: [Float64Array.from({ length: 20 }, (_, i) => -i)],
    };
    expect(draw(scheme)).toEqual(Array.from({ length: n }, (_, i) => -i));
    expect(() => labelSampler(scheme, y, trials, 5, true)).toThrow(/cannot stand in/);
  });
});

describe('number of arrangements', () => {
  const count = (scheme: NullSpec, values: Float64Array): number =>
    Math.round(Math.exp(planDraws(scheme, values, trials, n).logArrangements ?? NaN));
  it('is the multinomial of the scheme', () => {
    const two = y.map((i) => i % 2);
    expect(count({ kind: 'free', draws: 1 }, two)).toBe(924); // 12!/(6!6!)
    expect(count({ kind: 'within', codes, draws: 1 }, two)).toBe(216); // (4!/(2!2!))³
    expect(count({ kind: 'groups', codes, draws: 1 }, y)).toBe(6);
    expect(count({ kind: 'circularShift', draws: 1 }, y)).toBe(12);
  });
  it('refuses a scheme that changes nothing', () => {
    const constant = Float64Array.from(codes);
    const { problems } = planDraws({ kind: 'within', codes, draws: 10 }, constant, trials, n);
    expect(problems[0].message).toMatch(/label never varies/);
  });
});
