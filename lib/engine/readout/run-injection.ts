import { calibrateInjection, type InjectionBase } from '@/lib/engine/controls/calibrate-injection';
import { injectSignal } from '@/lib/engine/controls/inject-signal';
import { labelSampler } from '@/lib/engine/controls/label-sampler';
import { fitFold } from '@/lib/engine/crossval/fit-fold';
import { findBins } from '@/lib/engine/features/find-bins';
import type { Linalg } from '@/lib/engine/linalg/port';
import { randomNormal } from '@/lib/engine/random/random-normal';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import { INJECTION_NULL_DRAWS } from '@/lib/engine/readout/plan-controls';
import { runDraws } from '@/lib/engine/readout/run-draws';
import { taskLabels, taskSetup } from '@/lib/engine/readout/task-data';
import type {
  ChunkCache,
  ChunkOutput,
  NullSpec,
  ReadoutInput,
  ReadoutPlan,
} from '@/lib/engine/readout/types';

/**
 * One session with a signal of known size put into it, read out with its own shuffled control.
 *
 * Labels are first permuted by the recipe's scheme, so that what was there is gone; then rates are moved along one fixed
 * random unit pattern in proportion to the permuted label. Gives `r2`, `exceedances` among `draws` label draws, and the
 * calibrated `amplitude` and `populationR2`.
 */
export function runInjection(
  input: ReadoutInput,
  plan: ReadoutPlan,
  job: { control: number; size: number; draw: number },
  linalg: Linalg,
  cache: ChunkCache,
): ChunkOutput['values'] {
  const control = input.controls[job.control];
  if (control.kind !== 'injection') throw new RangeError('not an injection');
  const { trials } = plan.foldSets[0];
  const y = taskLabels(input, plan, plan.tasks[0]);
  const n = y.length;
  const scheme: NullSpec =
    input.nullScheme.kind === 'none' ? { kind: 'free', draws: INJECTION_NULL_DRAWS } : input.nullScheme;
  const available = drawsAvailable(scheme, n);
  const permutedSeed = (input.seed ^ 0x5bd1e995) >>> 0; // draws apart from those of the readout's own shuffled control
  const permuted = new Float64Array(n);
  labelSampler(scheme, y, trials, permutedSeed)(job.draw % available, permuted, 0);

  const base = injectionBase(input, trials, y);
  const key = `injection ${job.control} ${job.size}`;
  const kept = cache.get(key) as { amplitude: number; r2: number } | undefined;
  const calibrated = kept ?? calibrateInjection(base, control.sizes[job.size], input.seed, linalg);
  if (kept === undefined) cache.set(key, calibrated, 64);

  const counts = base.counts.slice();
  const generator = splitGenerator(input.seed, 'injection', job.control, job.size, job.draw);
  const width = base.nUnits * base.nBins;
  const { mean, sd } = meanAndSd(y);
  for (let i = 0; i < n; i++) {
    const trial = counts.subarray(i * width, (i + 1) * width);
    const z = (permuted[i] - mean) / sd;
    injectSignal(trial, z, calibrated.amplitude, base.pattern, base.binMeans, base.nBins, generator);
  }
  const x = new Float64Array(n * base.p);
  for (let i = 0; i < n; i++) base.toFeatures(counts.subarray(i * width, (i + 1) * width), x, i * base.p);

  const draws = Math.min(INJECTION_NULL_DRAWS, available);
  const rows = new Float64Array((draws + 1) * n);
  rows.set(permuted);
  const sample = labelSampler(scheme, permuted, trials, (permutedSeed + 1 + job.draw) >>> 0);
  for (let b = 0; b < draws; b++) sample(b, rows, (b + 1) * n);
  const r2 = sessionR2(input, plan, x, base.p, rows, draws + 1, linalg, cache);
  const bar = r2[0] - 1e-12 * Math.max(1, Math.abs(r2[0]));
  let exceedances = 0;
  for (let b = 1; b <= draws; b++) if (r2[b] >= bar) exceedances++;
  return { r2: r2[0], exceedances, draws, amplitude: calibrated.amplitude, populationR2: calibrated.r2 };
}

function drawsAvailable(scheme: NullSpec, n: number): number {
  switch (scheme.kind) {
    case 'circularShift':
      return n - 1;
    case 'given':
      return scheme.permutations.length;
    case 'sessions':
      return scheme.sequences.length;
    default:
      return Number.MAX_SAFE_INTEGER;
  }
}

function meanAndSd(y: Float64Array): { mean: number; sd: number } {
  const mean = y.reduce((sum, value) => sum + value, 0) / y.length;
  const sd = Math.sqrt(y.reduce((sum, value) => sum + (value - mean) ** 2, 0) / y.length);
  return { mean, sd };
}

function injectionBase(input: ReadoutInput, trials: Int32Array, y: Float64Array): InjectionBase {
  const range = findBins(input.window, input.windowStartMs, input.binWidthMs, input.nBins);
  if (!range.ok) throw new RangeError(range.message);
  const nBins = range.to - range.from;
  const nUnits = input.unitIndex.length;
  const n = trials.length;
  const width = nUnits * nBins;
  const counts = new Int32Array(n * width);
  const binMeans = new Float64Array(width);
  for (let i = 0; i < n; i++) {
    for (let u = 0; u < nUnits; u++) {
      const from = (trials[i] * input.nUnits + input.unitIndex[u]) * input.nBins + range.from;
      for (let b = 0; b < nBins; b++) {
        const count = input.counts[from + b];
        counts[i * width + u * nBins + b] = count;
        binMeans[u * nBins + b] += count / n;
      }
    }
  }
  const generator = splitGenerator(input.seed, 'pattern');
  const pattern = Float64Array.from({ length: nUnits }, () => randomNormal(generator));
  const { mean, sd } = meanAndSd(y);
  const isBins = input.features === 'bins';
  const feature = (count: number): number => (input.transform === 'sqrt' ? Math.sqrt(count + 0.375) : count);
  return {
    counts,
    n,
    nUnits,
    nBins,
    z: y.map((value) => (value - mean) / sd),
    pattern,
    binMeans,
    p: isBins ? width : nUnits,
    toFeatures: (trial, out, at) => {
      if (isBins) {
        for (let j = 0; j < width; j++) out[at + j] = feature(trial[j]);
        return;
      }
      for (let u = 0; u < nUnits; u++) {
        let sum = 0;
        for (let b = 0; b < nBins; b++) sum += trial[u * nBins + b];
        out[at + u] = feature(sum);
      }
    },
  };
}

/** Pooled held-out R² (mean over repeats) of each of m label rows on features `x`, with the readout's folds and design. */
function sessionR2(
  input: ReadoutInput,
  plan: ReadoutPlan,
  x: Float64Array,
  p: number,
  rows: Float64Array,
  m: number,
  linalg: Linalg,
  cache: ChunkCache,
): Float64Array {
  const task = plan.tasks[0];
  const set = plan.foldSets[0];
  const error = Array.from({ length: set.nRepeats }, () => new Float64Array(m));
  const baseline = Array.from({ length: set.nRepeats }, () => new Float64Array(m));
  for (const split of set.splits) {
    const setup = { ...taskSetup(input, plan, task, split, cache, [split.repeat, split.fold], true), x, p };
    const values = runDraws(task, fitFold(setup, linalg), setup.train, setup.test, rows, m, linalg);
    (values.error as Float64Array).forEach((e, b) => (error[split.repeat][b] += e));
    (values.baseline as Float64Array).forEach((e, b) => (baseline[split.repeat][b] += e));
  }
  return Float64Array.from({ length: m }, (_, b) => {
    let sum = 0;
    for (let repeat = 0; repeat < set.nRepeats; repeat++) {
      sum += baseline[repeat][b] > 0 ? 1 - error[repeat][b] / baseline[repeat][b] : 0;
    }
    return sum / set.nRepeats;
  });
}
