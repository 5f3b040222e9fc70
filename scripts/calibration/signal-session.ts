import { randomInteger } from '@/lib/engine/random/random-integer';
import { randomNormal } from '@/lib/engine/random/random-normal';
import { randomPoisson } from '@/lib/engine/random/random-poisson';
import { randomUniform } from '@/lib/engine/random/random-uniform';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import type { CoverageCell } from '@/scripts/calibration/cells';

const LEVELS = [0, 0.25, 0.5, 0.75, 1];
const GAIN_SD = 0.2;

/** A session with signal, and what is needed to know any linear readout's true error on new trials. */
export interface SignalSession {
  counts: Int32Array;
  label: Float64Array;
  /** nTrials × nUnits: log rate at label 0.5 and gain 1 on that trial (the same on all trials without drift). */
  logRate: Float64Array;
  /** nUnits: change of log rate from label 0 to label 1. */
  tuning: Float64Array;
}

/**
 * Poisson units, log rate = base + tuning·(y − .5) + gain, with independent labels of five levels, a gain that all units share on a
 * trial (sd .2) and, with drift, a random walk of the base (.03 a trial). Tuning has sd `strength`. Populations differ by seed.
 */
export function signalSession(cell: CoverageCell, seed: number): SignalSession {
  const { nTrials, nUnits, strength, hasDrift } = cell;
  const random = splitGenerator(seed, 'signal session');
  const base = Float64Array.from({ length: nUnits }, () => Math.log(2 + 8 * randomUniform(random)));
  const tuning = Float64Array.from({ length: nUnits }, () => strength * randomNormal(random));
  const counts = new Int32Array(nTrials * nUnits);
  const label = new Float64Array(nTrials);
  const logRate = new Float64Array(nTrials * nUnits);
  for (let i = 0; i < nTrials; i += 1) {
    label[i] = LEVELS[randomInteger(random, LEVELS.length)];
    const gain = GAIN_SD * randomNormal(random);
    for (let j = 0; j < nUnits; j += 1) {
      if (hasDrift) base[j] += 0.03 * randomNormal(random);
      logRate[i * nUnits + j] = base[j];
      counts[i * nUnits + j] = randomPoisson(random, Math.exp(base[j] + tuning[j] * (label[i] - 0.5) + gain));
    }
  }
  return { counts, label, logRate, tuning };
}

/**
 * Expected squared error of a linear readout ŷ = intercept + Σ w x on a new trial with the rates of trial i, and of a constant: exact,
 * from the moments of Poisson counts under a log-normal gain g (E g = e^{s²/2}, E g² = e^{2s²}), averaged over the five levels.
 */
export function expectedErrors(
  session: SignalSession,
  nUnits: number,
  trial: number,
  intercept: number,
  weights: ArrayLike<number>,
  constant: number,
): { readout: number; constant: number } {
  const first = Math.exp((GAIN_SD * GAIN_SD) / 2);
  const second = Math.exp(2 * GAIN_SD * GAIN_SD);
  let readout = 0;
  let reference = 0;
  for (const y of LEVELS) {
    let sum = 0;
    let squares = 0;
    for (let j = 0; j < nUnits; j += 1) {
      const rate = Math.exp(session.logRate[trial * nUnits + j] + session.tuning[j] * (y - 0.5));
      sum += weights[j] * rate;
      squares += weights[j] * weights[j] * rate;
    }
    const bias = y - intercept - sum * first;
    readout += (bias * bias + squares * first + sum * sum * (second - first * first)) / LEVELS.length;
    reference += (y - constant) ** 2 / LEVELS.length;
  }
  return { readout, constant: reference };
}
