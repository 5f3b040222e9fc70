import { shuffle } from '@/lib/engine/random/shuffle';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import type { ReadoutInput } from '@/lib/engine/readout/types';
import type { BenchSize } from '@/scripts/bench/sizes';

/** Seeded counts with a shared gain, labels at six levels, five folds and permutations: the same for every contestant. */
export function makeBenchInput(size: BenchSize, windows: number): ReadoutInput {
  const { n, p, draws } = size;
  const generator = splitGenerator(20261201, 'bench', n, p);
  const counts = new Uint8Array(n * p * windows);
  const y = Float64Array.from({ length: n }, (_, i) => (i % 6) / 5);
  shuffle(y, generator);
  for (let t = 0; t < n; t++) {
    const gain = 3 + ((generator.next() >>> 0) % 4);
    for (let u = 0; u < p; u++) {
      const lift = u % 10 === 0 && y[t] > 0.5 ? 1 : 0;
      for (let b = 0; b < windows; b++) {
        // 32 coins at gain/16: quick to make, and close enough to a spike count
        const bits = generator.next() & generator.next();
        let ones = 0;
        for (let rest = bits >>> (32 - 4 * gain); rest !== 0; rest &= rest - 1) ones++;
        counts[(t * p + u) * windows + b] = ones + lift;
      }
    }
  }
  const assignment = Int32Array.from({ length: n }, (_, i) => i % 5);
  shuffle(assignment, generator);
  const permutations = Array.from({ length: draws }, () => {
    const row = Int32Array.from({ length: n }, (_, i) => i);
    shuffle(row, generator);
    return row;
  });
  const all = (length: number): Int32Array => Int32Array.from({ length }, (_, i) => i);
  return {
    counts,
    nTrials: n,
    nUnits: p,
    nBins: windows,
    binWidthMs: 100,
    windowStartMs: 0,
    y,
    labelName: 'label',
    trialIndex: all(n),
    unitIndex: all(p),
    window: { startMs: 0, endMs: 100 },
    features: 'windowMean',
    transform: 'none',
    estimator: { kind: 'ridge', penalty: { choose: 'leaveOneOut' } },
    folds: { kind: 'given', assignment: [assignment] },
    nuisance: { variables: [], handling: 'none' },
    nullScheme: { kind: 'given', permutations },
    controls: [],
    views: windows > 1 ? [{ kind: 'timeCourse', widthMs: 100, stepMs: 100 }] : [],
    seed: 1,
  };
}
