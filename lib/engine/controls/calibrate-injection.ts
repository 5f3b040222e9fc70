import { injectSignal } from '@/lib/engine/controls/inject-signal';
import type { Linalg } from '@/lib/engine/linalg/port';
import { randomInteger } from '@/lib/engine/random/random-integer';
import { splitGenerator } from '@/lib/engine/random/split-generator';

/** What an injection works on: the window's counts of the included trials. */
export interface InjectionBase {
  /** n × units × bins. */
  counts: Int32Array;
  n: number;
  nUnits: number;
  nBins: number;
  /** Labels in standard deviations about their mean, by position. */
  z: Float64Array;
  pattern: Float64Array;
  binMeans: Float64Array;
  /** Features of one trial's counts (units × bins), written to `out` from `at` on. */
  toFeatures: (counts: Int32Array, out: Float64Array, at: number) => void;
  p: number;
}

const POPULATION_TRIALS = 100_000;
const BLOCK = 500;
const STEPS = 3;

/**
 * The amplitude at which the best linear readout of a generated session of 10⁵ trials has the given population R².
 *
 * Generated trials are recorded ones drawn with replacement, each with a label drawn apart from it. R² is that of least
 * squares, adjusted for p (Ezekiel): 1 − (1 − R²)(N − 1)/(N − p − 1). Three steps of a secant in log amplitude on
 * R²/(1 − R²), which is nearly quadratic in the amplitude; the same random numbers each time.
 * Returns the amplitude and the R² that it was measured to have. Cost 3·10⁵·p·(p + a few hundred) flops.
 */
export function calibrateInjection(
  base: InjectionBase,
  size: number,
  seed: number,
  linalg: Linalg,
): { amplitude: number; r2: number } {
  const odds = (r2: number): number => Math.max(r2, 1e-6) / (1 - Math.min(r2, 1 - 1e-6));
  const wanted = odds(size);
  let amplitude = Math.sqrt(wanted / base.nUnits);
  let r2 = 0;
  for (let step = 0; step < STEPS; step++) {
    r2 = populationR2(base, amplitude, seed, linalg);
    if (Math.abs(r2 - size) < 0.01 * size || step === STEPS - 1) break;
    amplitude *= Math.sqrt(wanted / odds(r2));
  }
  return { amplitude, r2 };
}

function populationR2(base: InjectionBase, amplitude: number, seed: number, linalg: Linalg): number {
  const { n, nUnits, nBins, p } = base;
  const generator = splitGenerator(seed, 'population');
  const width = nUnits * nBins;
  const trial = new Int32Array(width);
  const block = new Float64Array(BLOCK * p);
  const labels = new Float64Array(BLOCK);
  const gram = new Float64Array(p * p);
  const cross = new Float64Array(p);
  const sums = new Float64Array(p);
  let ySum = 0;
  let ySquares = 0;
  for (let done = 0; done < POPULATION_TRIALS; done += BLOCK) {
    for (let row = 0; row < BLOCK; row++) {
      const from = randomInteger(generator, n) * width;
      trial.set(base.counts.subarray(from, from + width));
      const z = base.z[randomInteger(generator, n)];
      injectSignal(trial, z, amplitude, base.pattern, base.binMeans, nBins, generator);
      base.toFeatures(trial, block, row * p);
      labels[row] = z;
      ySum += z;
      ySquares += z * z;
    }
    for (let row = 0; row < BLOCK; row++) for (let j = 0; j < p; j++) sums[j] += block[row * p + j];
    linalg.gemm('transpose', 'none', p, p, BLOCK, 1, block, p, block, p, 1, gram, p);
    linalg.gemm('none', 'none', 1, p, BLOCK, 1, labels, BLOCK, block, p, 1, cross, p);
  }
  const N = POPULATION_TRIALS;
  const total = ySquares - (ySum * ySum) / N;
  for (let i = 0; i < p; i++) {
    cross[i] -= (sums[i] * ySum) / N;
    for (let j = 0; j < p; j++) gram[i * p + j] -= (sums[i] * sums[j]) / N;
  }
  const { values, vectors } = linalg.symmetricEigen(p, gram);
  let explained = 0;
  for (let j = 0; j < p; j++) {
    if (!(values[j] > values[p - 1] * 1e-10)) continue;
    let along = 0;
    for (let i = 0; i < p; i++) along += vectors[j * p + i] * cross[i];
    explained += (along * along) / values[j];
  }
  const r2 = explained / total;
  return 1 - ((1 - r2) * (N - 1)) / Math.max(1, N - p - 1);
}
