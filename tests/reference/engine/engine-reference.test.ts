import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { Linalg } from '@/lib/engine/linalg/port';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { runReadout } from '@/lib/engine/readout/run-readout';
import type { EstimatorSpec } from '@/lib/engine/readout/types';
import { openNativeLinalg } from '@/lib/native/open-linalg';
import { makeReferenceInput, type ReferenceData } from '@/tests/reference/engine/reference-data';

interface Setting {
  data: ReferenceData;
  countsSum: number;
  kind: string;
  r2: number;
  exceedances: number;
  penalties: (number | null)[];
  predicted: number[];
  draws: number;
  nullR2: number[];
}
interface Reference {
  seed: number;
  versions: Record<string, string>;
  settings: Setting[];
}

// Made by scripts/reference/make-engine-reference.py with scikit-learn and numpy; versions and seed stand inside.
const committed = readFileSync('tests/fixtures/engine-reference.json', 'utf8');
const reference = JSON.parse(committed) as Reference;

const estimators: Record<string, EstimatorSpec> = {
  leastSquares: { kind: 'leastSquares' },
  ridgeFixed: { kind: 'ridge', penalty: { value: 50 } },
  ridgeLeaveOneOut: { kind: 'ridge', penalty: { choose: 'leaveOneOut' } },
  ridgeInnerFolds: { kind: 'ridge', penalty: { choose: 'innerFolds' } },
  pcr: { kind: 'pcr', components: { value: 5 } },
  pls: { kind: 'pls', components: { value: 3 } },
};

const native = openNativeLinalg();
const backends: [string, Linalg][] = [['portable', portableLinalg]];
if (native !== null) backends.unshift(['native', native]);

describe.each(backends)(
  'scikit-learn and the engine (%s) on the same folds and permutations',
  (name, linalg) => {
    it.each(reference.settings.map((setting) => [`${setting.data.name}, ${setting.kind}`, setting] as const))(
      '%s',
      (_, setting) => {
        const input = makeReferenceInput(setting.data);
        expect(Array.from(input.counts).reduce((a, b) => a + b, 0)).toBe(setting.countsSum);
        if (input.nullScheme.kind !== 'given') throw new Error('given permutations are wanted');
        // The portable backend is slow: a part of the draws shows that it agrees.
        const draws = name === 'portable' ? Math.min(60, setting.draws) : setting.draws;
        const permutations = input.nullScheme.permutations.slice(0, draws);
        const result = runReadout(
          { ...input, estimator: estimators[setting.kind], nullScheme: { kind: 'given', permutations } },
          linalg,
        );
        if (!result.ok) throw new Error(JSON.stringify(result.problems));
        const { heldOut, null: control, predictions, penalty } = result.numbers;
        expect(Math.abs((heldOut.r2 ?? NaN) - setting.r2)).toBeLessThan(1e-10);
        setting.predicted.forEach((value, i) => {
          expect(Math.abs(predictions.predicted[i] - value)).toBeLessThan(1e-10);
        });
        setting.penalties.forEach((value, fold) => {
          if (value !== null) expect(penalty[fold]).toBeCloseTo(value, 8);
        });
        control?.values.forEach((value, b) => {
          expect(Math.abs(value - setting.nullR2[b])).toBeLessThan(1e-10);
        });
        expect(control?.values.length).toBe(draws);
        if (draws === setting.draws) expect(control?.exceedances).toBe(setting.exceedances);
      },
    );
  },
);

describe('the reference itself', () => {
  it('has weak-signal settings whose counts lie between 20 and 800 of 1,000', () => {
    const weak = reference.settings.filter(({ data, draws }) => data.tuned > 0 && draws === 1000);
    expect(weak.length).toBeGreaterThanOrEqual(6);
    for (const { exceedances } of weak) {
      expect(exceedances).toBeGreaterThanOrEqual(20);
      expect(exceedances).toBeLessThanOrEqual(800);
    }
  });

  const python = spawnSync('/usr/bin/python3', ['-c', 'import sklearn']);
  it.skipIf(python.status !== 0)(
    'comes out the same when it is made again (skipped where /usr/bin/python3 has no scikit-learn)',
    () => {
      const folder = mkdtempSync(join(tmpdir(), 'engine-reference-'));
      try {
        const out = join(folder, 'again.json');
        execFileSync('/usr/bin/python3', ['scripts/reference/make-engine-reference.py', out], {
          env: { ...process.env, OPENBLAS_NUM_THREADS: '1' },
          stdio: 'pipe',
        });
        const again = JSON.parse(readFileSync(out, 'utf8')) as Reference;
        expect(again.settings.length).toBe(reference.settings.length);
        again.settings.forEach((setting, at) => {
          const kept = reference.settings[at];
          expect([setting.data, setting.kind, setting.countsSum, setting.exceedances]).toEqual([
            kept.data,
            kept.kind,
            kept.countsSum,
            kept.exceedances,
          ]);
          expect(Math.abs(setting.r2 - kept.r2)).toBeLessThan(1e-10);
          setting.nullR2.forEach((value, b) => expect(Math.abs(value - kept.nullR2[b])).toBeLessThan(1e-10));
        });
      } finally {
        rmSync(folder, { recursive: true });
      }
    },
    120_000,
  );
});
