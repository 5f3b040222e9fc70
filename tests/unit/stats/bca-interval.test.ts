import { describe, expect, it } from 'vitest';
import { bcaInterval } from '@/lib/engine/measures/bca-interval';
import { randomSource } from '@/lib/engine/random/random-source';
import { splitGenerator } from '@/lib/engine/random/split-generator';

const stream = (...indices: number[]): ReturnType<typeof randomSource> =>
  randomSource(splitGenerator(3, 'bca', ...indices));

function deviations(n: number, noise: number, seed: number): { error: Float64Array; baseline: Float64Array } {
  const random = stream(1, seed);
  const error = new Float64Array(n);
  const baseline = new Float64Array(n);
  for (let i = 0; i < n; i += 1) {
    const e = noise * random.normal();
    error[i] = e * e;
    baseline[i] = (random.normal() + e) ** 2;
  }
  return { error, baseline };
}

describe('BCa interval of held-out R² with the readouts held fixed', () => {
  it('covers the R² of fixed readouts near its level when trials are independent', () => {
    // Source: the simulation's own truth, R² = 1 − s²/(1 + s²) with error s·N(0, 1) independent of the signal.
    const noise = 1;
    let covered = 0;
    const sessions = 300;
    for (let s = 0; s < sessions; s += 1) {
      const { error, baseline } = deviations(150, noise, s);
      const interval = bcaInterval(error, baseline, stream(2, s), { draws: 400 });
      if (interval && interval.low <= 0.5 && 0.5 <= interval.high) covered += 1;
    }
    // Binomial 99.9 % band around .95 for 300 sessions is ± .041; BCa falls a little short at n = 150.
    expect(covered / sessions).toBeGreaterThan(0.89);
    expect(covered / sessions).toBeLessThan(0.99);
  });

  it('gives [1, 1] for a perfect fit and null without a baseline', () => {
    expect(bcaInterval([0, 0, 0, 0], [1, 2, 1, 2], stream(3))).toMatchObject({ low: 1, high: 1 });
    expect(bcaInterval([1, 1, 1], [0, 0, 0], stream(3))).toBeNull();
    expect(bcaInterval([1, 1], [1, 1], stream(3))).toBeNull();
    // Only one trial differs from its training mean: without it there is no R².
    expect(bcaInterval([1, 1, 1, 1], [0, 0, 3, 0], stream(3))).toBeNull();
  });

  it('names its method, its blocks and its draws', () => {
    const { error, baseline } = deviations(64, 1, 0);
    const trials = bcaInterval(error, baseline, stream(4));
    const blocks = bcaInterval(error, baseline, stream(4), { blocks: true });
    expect(trials?.method).toBe('test-trial interval, readouts held fixed (BCa over trials, 2000 draws)');
    expect(blocks?.method).toContain('moving blocks of 4 trials');
  });

  it('moving blocks widen the interval where neighbours agree', () => {
    const { error, baseline } = deviations(40, 1, 7);
    const runs = (values: Float64Array): number[] =>
      Array.from(values).flatMap((value) => new Array<number>(10).fill(value));
    const single = bcaInterval(runs(error), runs(baseline), stream(5));
    const block = bcaInterval(runs(error), runs(baseline), stream(5), { blocks: true, blockTrials: 20 });
    expect((block?.high ?? 0) - (block?.low ?? 0)).toBeGreaterThan(
      2 * ((single?.high ?? 9) - (single?.low ?? 0)),
    );
  });

  it('is the same for the same generator and takes well under a second at n = 2000', () => {
    const { error, baseline } = deviations(2000, 1, 1);
    const started = performance.now();
    const first = bcaInterval(error, baseline, stream(6));
    const ms = performance.now() - started;
    expect(bcaInterval(error, baseline, stream(6))).toEqual(first);
    expect(ms).toBeLessThan(1000);
  });
});
