import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitFold } from '@/lib/engine/crossval/fit-fold';
import { pickCandidate } from '@/lib/engine/crossval/pick-candidate';
import { projectLabels } from '@/lib/engine/crossval/project-labels';
import { scoreClosedForm } from '@/lib/engine/crossval/score-closed-form';
import { scoreOpenCandidates } from '@/lib/engine/crossval/score-open-candidates';
import { screenPenalties } from '@/lib/engine/crossval/screen-penalties';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { randomNormal } from '@/lib/engine/random/random-normal';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import { openNativeLinalg } from '@/lib/native/open-linalg';

const linalg = openNativeLinalg() ?? portableLinalg;
const M = 40;

describe('single-precision screening', () => {
  it.each(['leaveOneOut', 'gcv'] as const)('leaves the choice by %s as it is', (choose) => {
    let alone = 0;
    let all = 0;
    fc.assert(
      fc.property(
        fc.record({
          seed: fc.nat(100_000),
          n: fc.integer({ min: 20, max: 120 }),
          p: fc.integer({ min: 8, max: 160 }),
          signal: fc.constantFrom(0, 0.05, 0.5, 3),
          shared: fc.constantFrom(0, 1, 10),
        }),
        ({ seed, n, p, signal, shared }) => {
          const generator = splitGenerator(seed, 'screen');
          const x = new Float64Array(n * p);
          const labels = Float64Array.from({ length: M * n }, () => randomNormal(generator));
          for (let i = 0; i < n; i++) {
            const gain = shared * randomNormal(generator);
            for (let j = 0; j < p; j++)
              x[i * p + j] = randomNormal(generator) + gain + signal * labels[i] * (j % 3);
          }
          const rows = Int32Array.from({ length: n }, (_, i) => i);
          const fit = fitFold(
            {
              x,
              p,
              train: rows,
              test: rows.slice(0, 2),
              estimator: { kind: 'ridge', penalty: { choose } },
              scaling: 'unit',
              trials: rows,
            },
            linalg,
          );
          if (fit.chooser.kind !== 'closedForm') throw new Error('closed form is wanted');
          const { weights, screen } = fit.chooser;
          const plan = screen();
          if (plan === null) return; // a candidate without a score: nothing is screened
          const { c, residual } = projectLabels(fit, labels, M, linalg);
          const full = scoreClosedForm(fit.factor, fit.candidates, weights, residual, c, M, linalg);
          const open = screenPenalties(plan, fit.factor, fit.candidates, residual, c, M, linalg);
          const part = scoreOpenCandidates(fit.factor, fit.candidates, weights, residual, c, M, open, linalg);
          const count = fit.candidates.length;
          for (let row = 0; row < M; row++) {
            expect(pickCandidate(part, row * count, count)).toBe(pickCandidate(full, row * count, count));
            alone += open.subarray(row * count, (row + 1) * count).reduce((a, b) => a + b, 0) === 1 ? 1 : 0;
            all++;
          }
        },
      ),
      { numRuns: 60 },
    );
    expect(alone / all).toBeGreaterThan(0.5); // otherwise it would save nothing
  });
});
