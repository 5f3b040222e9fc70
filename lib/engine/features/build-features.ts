import { EngineError } from '@/lib/engine/engine-error';
import { chooseUnits } from '@/lib/engine/features/choose-units';
import { findBins } from '@/lib/engine/features/find-bins';
import type { FeatureSpec, ReadoutInput } from '@/lib/engine/readout/types';

/** n × p features, row-major; feature (u, b) of 'bins' is column u·(bins in the window) + b. */
export interface Features {
  n: number;
  p: number;
  x: Float64Array;
  /** Columns that belong to one unit (bins), for shuffles that move a unit's features together. */
  columnsPerUnit: number;
}

/**
 * The features of the given trials, before any scaling.
 *
 * - windowMean: spikes/s over the window; with 'sqrt' √(count + 3/8) of the window's count (Anscombe, Biometrika 1948).
 * - bins: the same for each bin of the window.
 * - totalRate: the selected units' summed count as one feature (spikes/s, or its Anscombe root).
 * - rateNormalised: counts divided by that sum, no transform; 0 in a trial without any spike.
 * - trialOrder: the trial's number in the session. none: no feature (p = 0).
 *
 * `trials`: session trials, any order; rows follow them. Nothing passed in is changed.
 * Throws EngineError when the window is not made of whole bins. Cost: one pass over the counts used.
 */
export function buildFeatures(input: ReadoutInput, trials: Int32Array, spec: FeatureSpec): Features {
  const n = trials.length;
  if (spec.kind === 'none') return { n, p: 0, x: new Float64Array(0), columnsPerUnit: 1 };
  if (spec.kind === 'trialOrder') return { n, p: 1, x: Float64Array.from(trials), columnsPerUnit: 1 };
  const range = findBins(spec.window, input.windowStartMs, input.binWidthMs, input.nBins);
  if (!range.ok) throw new EngineError('invalidOption', range.message);
  const units = chooseUnits(spec.units, input.unitIndex, input.seed);
  const width = range.to - range.from;
  const isPerBin = spec.kind === 'bins' || (spec.kind === 'rateNormalised' && input.features === 'bins');
  const perUnit = isPerBin ? width : 1;
  const { counts, nUnits, nBins } = input;
  const p = units.length * perUnit;
  const x = new Float64Array(n * p);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < units.length; j++) {
      const start = (trials[i] * nUnits + units[j]) * nBins + range.from;
      const out = i * p + j * perUnit;
      if (isPerBin) {
        for (let b = 0; b < width; b++) x[out + b] = counts[start + b];
      } else {
        let sum = 0;
        for (let b = 0; b < width; b++) sum += counts[start + b];
        x[out] = sum;
      }
    }
  }
  if (spec.kind === 'totalRate' || spec.kind === 'rateNormalised') {
    const totals = new Float64Array(n);
    for (let i = 0; i < n; i++) for (let j = 0; j < p; j++) totals[i] += x[i * p + j];
    if (spec.kind === 'totalRate') {
      toFeature(totals, spec.transform, width * input.binWidthMs);
      return { n, p: 1, x: totals, columnsPerUnit: 1 };
    }
    for (let i = 0; i < n; i++) {
      if (totals[i] > 0) for (let j = 0; j < p; j++) x[i * p + j] /= totals[i];
    }
    return { n, p, x, columnsPerUnit: perUnit };
  }
  toFeature(x, spec.transform, (isPerBin ? 1 : width) * input.binWidthMs);
  return { n, p, x, columnsPerUnit: perUnit };
}

/** Counts over `spanMs` to spikes/s or to Anscombe roots, in place. */
function toFeature(x: Float64Array, transform: 'none' | 'sqrt', spanMs: number): void {
  if (transform === 'sqrt') for (let i = 0; i < x.length; i++) x[i] = Math.sqrt(x[i] + 0.375);
  else for (let i = 0; i < x.length; i++) x[i] = (x[i] * 1000) / spanMs;
}
