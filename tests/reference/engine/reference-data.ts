import type { ReadoutInput } from '@/lib/engine/readout/types';

/** How the reference script made a data set; see scripts/reference/make-engine-reference.py. */
export interface ReferenceData {
  name: string;
  seed: number;
  n: number;
  units: number;
  step: number;
  tuned: number;
}

const LEVELS = 6;
const FOLDS = 5;
const CHANCES = 24;
const DRAWS = 1000;

/** The script's generator of whole numbers: x ← (1664525·x + 1013904223) mod 2³², whole(m) = ⌊x/256⌋ mod m. */
class Lcg {
  constructor(private x: number) {}

  whole(m: number): number {
    this.x = (Math.imul(1664525, this.x) + 1013904223) >>> 0;
    return (this.x >>> 8) % m;
  }

  shuffled(n: number): Int32Array {
    const order = Int32Array.from({ length: n }, (_, i) => i);
    for (let i = n - 1; i > 0; i--) {
      const j = this.whole(i + 1);
      [order[i], order[j]] = [order[j], order[i]];
    }
    return order;
  }
}

/** Makes the script's counts, labels, folds and permutations again, as an input of the engine. */
export function makeReferenceInput(data: ReferenceData): ReadoutInput {
  const { n, units, step, tuned } = data;
  const g = new Lcg(data.seed);
  const level = Array.from({ length: n }, () => g.whole(LEVELS));
  const gain = Array.from({ length: n }, () => g.whole(61) - 30);
  const base = Array.from({ length: units }, () => 80 + g.whole(300));
  const sign = Array.from({ length: units }, (_, u) => {
    if (u >= tuned) return 0;
    return g.whole(2) === 1 ? 1 : -1;
  });
  base[units - 1] = -(10 ** 6);
  const counts = new Int32Array(n * units * 3);
  for (let t = 0; t < n; t++) {
    for (let u = 0; u < units; u++) {
      const bar = base[u] + gain[t] + sign[u] * step * level[t];
      for (let b = 0; b < 3; b++) {
        let sum = 0;
        for (let c = 0; c < CHANCES; c++) if (g.whole(1000) < bar) sum++;
        counts[(t * units + u) * 3 + b] = sum;
      }
    }
  }
  const fold = new Int32Array(n);
  g.shuffled(n).forEach((trial, at) => (fold[trial] = at % FOLDS));
  const permutations = Array.from({ length: DRAWS }, () => g.shuffled(n));
  const inner = Array.from({ length: FOLDS }, (_, f) => {
    const train = Int32Array.from({ length: n }, (__, i) => i).filter((i) => fold[i] !== f);
    const row = new Int32Array(n).fill(-1);
    g.shuffled(train.length).forEach((j, at) => (row[train[j]] = at % 4));
    return row;
  });
  return {
    counts,
    nTrials: n,
    nUnits: units,
    nBins: 3,
    binWidthMs: 25,
    windowStartMs: 0,
    y: Float64Array.from(level, (l) => l / 5),
    labelName: 'level',
    trialIndex: Int32Array.from({ length: n }, (_, i) => i),
    unitIndex: Int32Array.from({ length: units }, (_, i) => i),
    window: { startMs: 0, endMs: 75 },
    features: 'windowMean',
    transform: 'none',
    estimator: { kind: 'leastSquares' },
    folds: { kind: 'given', assignment: [fold], inner: [inner] },
    nuisance: { variables: [], handling: 'none' },
    nullScheme: { kind: 'given', permutations },
    controls: [],
    views: [],
    seed: 0,
  };
}
