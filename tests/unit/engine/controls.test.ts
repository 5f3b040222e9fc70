import { describe, expect, it } from 'vitest';
import { breakCorrelations } from '@/lib/engine/features/break-correlations';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { runReadout } from '@/lib/engine/readout/run-readout';
import type { ControlNumbers, ControlSpec, NuisanceVariable, ReadoutInput } from '@/lib/engine/readout/types';
import { openNativeLinalg } from '@/lib/native/open-linalg';
import { makeInput } from '@/tests/unit/engine/make-input';

const linalg = openNativeLinalg() ?? portableLinalg;

function controlsOf(input: ReadoutInput, ...controls: ControlSpec[]): ControlNumbers[] {
  const result = runReadout({ ...input, controls }, linalg);
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  return result.numbers.controls;
}
const base = (signal: number, changes: Partial<ReadoutInput> = {}): ReadoutInput =>
  makeInput({ nTrials: 120, nUnits: 10, signal }, { nullScheme: { kind: 'free', draws: 59 }, ...changes });
const variable = (
  name: string,
  values: Float64Array,
  term: NuisanceVariable['term'] = 'linear',
): NuisanceVariable => ({ name, term, values });

describe('nuisance controls', () => {
  const strong = base(1);
  const same = variable(
    'copy of the label',
    strong.y.map((v) => 3 * v + 1),
  );
  const unrelated = variable(
    'speed',
    strong.y.map((_, i) => Math.sin(i * 12.9898) * 5),
    'spline',
  );

  it('nuisance only: a copy of the label explains the readout, an unrelated one does not', () => {
    const [copy, speed] = controlsOf(
      strong,
      { kind: 'nuisanceOnly', columns: [same] },
      { kind: 'nuisanceOnly', columns: [unrelated] },
    );
    expect(copy.heldOut?.r2).toBeCloseTo(1, 10);
    expect(copy.outcome).toBe('fails');
    expect(speed.outcome).toBe('survives');
    expect(speed.question).toBe('Can speed alone predict “shared fraction” in held-out trials?');
  });

  it('incremental and adjusted: nothing is left beside a copy of the label, all beside an unrelated one', () => {
    const noisy = variable(
      'noisy copy',
      strong.y.map((v, i) => v + 0.01 * Math.sin(i * 78.233)),
    );
    const [left, adjusted] = controlsOf(
      strong,
      { kind: 'incremental', columns: [unrelated] },
      { kind: 'adjusted', columns: [unrelated] },
    );
    expect(left.outcome).toBe('survives');
    expect(left.heldOut?.r2).toBeGreaterThan(0.5);
    expect(adjusted.outcome).toBe('survives');
    const [gone] = controlsOf(base(0), { kind: 'incremental', columns: [noisy] });
    expect(gone.outcome).toBe('fails');
  });

  it('incremental and adjusted differ only by when features are scaled: alike with a tiny penalty', () => {
    const input = base(1, { estimator: { kind: 'leastSquares' } });
    const [a, b] = controlsOf(
      input,
      { kind: 'incremental', columns: [unrelated] },
      { kind: 'adjusted', columns: [unrelated] },
    );
    expect(a.heldOut?.r2).toBeCloseTo(b.heldOut?.r2 as number, 9);
    a.null?.values.forEach((value, i) => expect(value).toBeCloseTo(b.null?.values[i] ?? NaN, 9));
  });

  it('trial order explains a trend', () => {
    const y = strong.y.map((_, i) => i / 120 + 0.05 * Math.sin(i));
    const [order] = controlsOf({ ...base(0), y }, { kind: 'trialOrder' });
    expect(order.heldOut?.r2).toBeGreaterThan(0.9);
    expect(order.outcome).toBe('cannotTell'); // the units themselves read nothing out
  });
});

describe('rate controls', () => {
  /** All units share one gain that follows the label. */
  function gainOnly(): ReadoutInput {
    const input = base(0);
    const counts = input.counts.map((count, at) =>
      Math.round(count * (1 + 2 * input.y[Math.floor(at / 40)])),
    );
    return { ...input, counts };
  }
  it('a gain is found by the total rate and lost by normalising', () => {
    const [total, normalised] = controlsOf(gainOnly(), { kind: 'totalRate' }, { kind: 'rateNormalised' });
    expect(total.heldOut?.r2).toBeGreaterThan(0.5);
    expect(total.outcome).not.toBe('survives');
    expect(normalised.heldOut?.r2 as number).toBeLessThan(0.3);
  });
});

describe('the correlation-breaking shuffle', () => {
  it('keeps each unit’s values within fold and level, and its bins together', () => {
    const n = 24;
    const x = Float64Array.from({ length: n * 4 }, (_, i) => i);
    const strata = Int32Array.from({ length: n }, (_, i) => i % 2);
    const foldOf = Int32Array.from({ length: n }, (_, i) => Math.floor(i / 12));
    const broken = breakCorrelations({ n, p: 4, x, columnsPerUnit: 2 }, strata, foldOf, 3, 0);
    let moved = 0;
    for (let i = 0; i < n; i++) {
      const [first, second] = [0, 2].map((column) => Math.floor(broken.x[i * 4 + column] / 4));
      for (const [unit, from] of [first, second].entries()) {
        expect([strata[from], foldOf[from]]).toEqual([strata[i], foldOf[i]]);
        expect(broken.x[i * 4 + 2 * unit + 1]).toBe(broken.x[i * 4 + 2 * unit] + 1);
      }
      if (first !== second) moved++;
    }
    expect(moved).toBeGreaterThan(n / 2);
    expect(Array.from(broken.x).sort((a, b) => a - b)).toEqual(Array.from(x));
  });
});

describe('window, matched, correlations, generalisation', () => {
  it('a window in which nothing happens survives', () => {
    const input = base(1);
    const silent = input.counts.map((count, at) => (at % 4 === 0 ? 3 : count));
    const [window] = controlsOf(
      { ...input, counts: silent, window: { startMs: 25, endMs: 100 } },
      { kind: 'window', startMs: 0, endMs: 25 },
    );
    expect(window.heldOut?.r2).toBeCloseTo(0, 10);
  });

  it('matched: balances label over the nuisance, keeps n, and averages 20 draws', () => {
    const input = base(1);
    const values = input.y.map((v, i) => v + Math.sin(i * 3.7));
    const [matched] = controlsOf(input, {
      kind: 'matched',
      column: 'speed',
      values,
      isCategory: false,
      draws: 20,
    });
    expect(matched.outcome).toBe('survives');
    expect(matched.detail.draws).toBe(20);
    expect(matched.detail.nKept as number).toBeLessThan(120);
    expect((matched.detail.r2 as number[]).length).toBe(20);
  });

  it('matched: says so when nothing can be balanced', () => {
    const input = base(1);
    const [matched] = controlsOf(input, {
      kind: 'matched',
      column: 'copy',
      values: input.y,
      isCategory: false,
      draws: 20,
    });
    expect(matched.outcome).toBe('cannotTell');
    expect(matched.sentence).toMatch(/Too few trials are left/);
  });

  it('broken correlations keep each unit’s tuning', () => {
    const [train, all] = controlsOf(
      base(1),
      { kind: 'breakCorrelations', scope: 'train' },
      { kind: 'breakCorrelations', scope: 'all' },
    );
    expect(train.outcome).toBe('survives');
    expect(all.outcome).toBe('survives');
  });

  it('generalises over a column that does not matter, with as many training trials on both sides', () => {
    const side = Int8Array.from({ length: 120 }, (_, i) => i % 2);
    const [across] = controlsOf(base(1), {
      kind: 'generalise',
      column: 'block',
      side,
      trainNames: ['a'],
      testNames: ['b'],
    });
    expect(across.outcome).toBe('survives');
    expect(across.heldOut?.nTrials).toBe(60);
    expect(across.detail.nTrain).toBe(48);
    expect(Math.abs((across.detail.withinR2 as number) - (across.heldOut?.r2 as number))).toBeLessThan(0.25);
    const few = Int8Array.from({ length: 120 }, (_, i) => (i < 117 ? 1 : 0));
    const [none] = controlsOf(base(1), {
      kind: 'generalise',
      column: 'block',
      side: few,
      trainNames: ['a'],
      testNames: ['b'],
    });
    expect(none.outcome).toBe('cannotTell');
  });

  it('injection: a large signal is found, its size is that of the generated population', () => {
    const input = makeInput(
      { nTrials: 60, nUnits: 5, nBins: 2, signal: 0 },
      { nullScheme: { kind: 'free', draws: 19 } },
    );
    const [found] = controlsOf(input, { kind: 'injection', sizes: [0.6], draws: 5 });
    const [power] = found.detail.powers as { populationR2: number; power: number }[];
    expect(Math.abs(power.populationR2 - 0.6)).toBeLessThan(0.03);
    expect(power.power).toBe(1);
    expect(found.detail.smallestDetectable).toBe(0.6);
  });

  it('cannot tell without a shuffled control', () => {
    const controls = controlsOf(
      { ...base(1), nullScheme: { kind: 'none' } },
      { kind: 'totalRate' },
      { kind: 'rateNormalised' },
    );
    for (const { outcome, sentence } of controls) {
      expect(outcome).toBe('cannotTell');
      expect(sentence).toMatch(/without a shuffled control/);
    }
  });
});
