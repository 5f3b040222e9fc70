import { describe, expect, it } from 'vitest';
import { evaluateLabels } from '@/lib/engine/crossval/evaluate-labels';
import { fitFold } from '@/lib/engine/crossval/fit-fold';
import type { FoldSetup } from '@/lib/engine/crossval/fold-setup';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { randomNormal } from '@/lib/engine/random/random-normal';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import type { PenaltySpec } from '@/lib/engine/readout/types';
import { openNativeLinalg } from '@/lib/native/open-linalg';

const linalg = openNativeLinalg() ?? portableLinalg;

describe('features in blocks', () => {
  it.each([
    ['leave-one-out', { choose: 'leaveOneOut' }],
    ['a fixed penalty', { value: 3 }],
    ['a penalty so small that the SVD takes over', { value: 1e-9 }],
  ] as [string, PenaltySpec][])('give the predictions of all at once: %s', (_, penalty) => {
    const generator = splitGenerator(3, 'wide');
    const [n, p] = [30, 101];
    const x = Float64Array.from({ length: n * p }, (__, i) => (i % p === 17 ? 4 : randomNormal(generator)));
    const y = Float64Array.from({ length: 24 }, () => randomNormal(generator));
    const rows = Int32Array.from({ length: n }, (__, i) => i);
    const setup: FoldSetup = {
      x,
      p,
      train: rows.slice(0, 24),
      test: rows.slice(24),
      estimator: { kind: 'ridge', penalty },
      scaling: 'unit',
      trials: rows,
    };
    const blocks = [0, 16, 40, 90].map((from, i, all) => ({ from, to: all[i + 1] ?? p }));
    const features = ({ from, to }: { from: number; to: number }): Float64Array =>
      Float64Array.from(
        { length: n * (to - from) },
        (__, i) => x[Math.floor(i / (to - from)) * p + from + (i % (to - from))],
      );
    const whole = fitFold(setup, linalg);
    const inBlocks = fitFold({ ...setup, x: new Float64Array(0), wide: { blocks, features } }, linalg);
    expect(inBlocks.kept).toEqual(whole.kept);
    expect(inBlocks.kept).toHaveLength(100);
    const a = evaluateLabels(whole, y, 1, linalg);
    const b = evaluateLabels(inBlocks, y, 1, linalg);
    expect(b.choice).toEqual(a.choice);
    a.predicted.forEach((value, i) => expect(b.predicted[i]).toBeCloseTo(value, 10));
  });
});
