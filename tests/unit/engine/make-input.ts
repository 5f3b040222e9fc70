import { randomNormal } from '@/lib/engine/random/random-normal';
import { randomPoisson } from '@/lib/engine/random/random-poisson';
import { shuffle } from '@/lib/engine/random/shuffle';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import type { ReadoutInput } from '@/lib/engine/readout/types';

/** Options of the made-up session. `signal` 0 carries nothing; 1 is easily read out. */
export interface MadeSession {
  nTrials?: number;
  nUnits?: number;
  nBins?: number;
  signal?: number;
  isContinuous?: boolean;
  seed?: number;
}

/** A small made-up session: Poisson units with a shared gain, a part of them tuned to the label. */
export function makeInput(options: MadeSession = {}, changes: Partial<ReadoutInput> = {}): ReadoutInput {
  const { nTrials = 60, nUnits = 8, nBins = 4, signal = 0.5, isContinuous = false, seed = 1 } = options;
  const generator = splitGenerator(seed, 'test session');
  const y = Float64Array.from({ length: nTrials }, (_, i) =>
    isContinuous ? randomNormal(generator) : (i % 6) / 5,
  );
  shuffle(y, generator);
  const tuning = Float64Array.from({ length: nUnits }, () => signal * randomNormal(generator));
  const rate = Float64Array.from({ length: nUnits }, () => 1 + 3 * Math.abs(randomNormal(generator)));
  const counts = new Int32Array(nTrials * nUnits * nBins);
  for (let t = 0; t < nTrials; t++) {
    const gain = Math.exp(0.2 * randomNormal(generator));
    for (let u = 0; u < nUnits; u++) {
      const mean = rate[u] * gain * Math.exp(0.5 * tuning[u] * (y[t] - (isContinuous ? 0 : 0.5)));
      for (let b = 0; b < nBins; b++) counts[(t * nUnits + u) * nBins + b] = randomPoisson(generator, mean);
    }
  }
  return {
    counts,
    nTrials,
    nUnits,
    nBins,
    binWidthMs: 25,
    windowStartMs: 0,
    y,
    labelName: 'shared fraction',
    trialIndex: Int32Array.from({ length: nTrials }, (_, i) => i),
    unitIndex: Int32Array.from({ length: nUnits }, (_, i) => i),
    window: { startMs: 0, endMs: 25 * nBins },
    features: 'windowMean',
    transform: 'none',
    estimator: { kind: 'ridge', penalty: { choose: 'leaveOneOut' } },
    folds: { kind: 'stratified', k: 5, repeats: 1 },
    nuisance: { variables: [], handling: 'none' },
    nullScheme: { kind: 'free', draws: 50 },
    controls: [],
    views: [],
    seed: 11,
    ...changes,
  };
}
