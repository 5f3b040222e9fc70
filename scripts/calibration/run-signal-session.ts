import { evaluateLabels } from '@/lib/engine/crossval/evaluate-labels';
import { fitFold } from '@/lib/engine/crossval/fit-fold';
import type { Linalg } from '@/lib/engine/linalg/port';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import { runReadout } from '@/lib/engine/readout/run-readout';
import type { EstimatorSpec, FoldsSpec, HeldOutNumbers, ReadoutInput } from '@/lib/engine/readout/types';
import type { CoverageCell } from '@/scripts/calibration/cells';
import { expectedErrors, signalSession, type SignalSession } from '@/scripts/calibration/signal-session';

const estimator: EstimatorSpec = { kind: 'ridge', penalty: { choose: 'leaveOneOut' } };

/** One simulated session's readout, and the R² that its fitted readouts would reach on new trials like its own. */
export interface SignalRun {
  heldOut: HeldOutNumbers;
  truth: number;
}

/** Runs the engine on a simulated session with signal and works out the fitted readouts' true R² exactly. */
export function runSignalSession(cell: CoverageCell, seed: number, linalg: Linalg): SignalRun {
  const session = signalSession(cell, seed);
  const input = inputOf(cell, session, seed);
  const result = runReadout(input, linalg);
  const planned = planReadout(input);
  if (!result.ok || !planned.ok) throw new Error(`${cell.id}, seed ${seed}: the readout was refused`);
  const { nUnits: p } = cell;
  // Held-out rows that tell a linear readout's intercept and weights apart: the origin and a step along each unit.
  const probes = new Float64Array((p + 1) * p);
  for (let j = 0; j < p; j += 1) probes[(j + 1) * p + j] = 1;
  const x = new Float64Array(session.counts.length + probes.length);
  x.set(session.counts);
  x.set(probes, session.counts.length);
  const probeRows = Int32Array.from({ length: p + 1 }, (_, r) => cell.nTrials + r);
  const trials = Int32Array.from({ length: cell.nTrials + p + 1 }, (_, i) => i);
  let error = 0;
  let baseline = 0;
  for (const split of planned.plan.foldSets[0].splits) {
    const test = Int32Array.from([...probeRows, ...split.test]);
    const fit = fitFold({ x, p, train: split.train, test, estimator, scaling: 'unit', trials }, linalg);
    const yTrain = Float64Array.from(split.train, (i) => session.label[i]);
    const { predicted, trainMean } = evaluateLabels(fit, yTrain, 1, linalg);
    const [intercept] = predicted;
    const weights = Float64Array.from({ length: p }, (_, j) => predicted[j + 1] - intercept);
    requireSameReadout(result.numbers.predictions, split.repeat, split.test[0], predicted[p + 1]);
    for (const trial of split.test) {
      const expected = expectedErrors(session, p, trial, intercept, weights, trainMean[0]);
      error += expected.readout;
      baseline += expected.constant;
    }
  }
  return { heldOut: result.numbers.heldOut, truth: 1 - error / baseline };
}

/** The readouts whose truth is worked out must be the very ones that the engine's run fitted. */
function requireSameReadout(
  predictions: { repeat: Int32Array; trial: Int32Array; predicted: Float64Array },
  repeat: number,
  trial: number,
  predicted: number,
): void {
  for (let row = 0; row < predictions.trial.length; row += 1) {
    if (predictions.repeat[row] !== repeat || predictions.trial[row] !== trial) continue;
    if (Math.abs(predictions.predicted[row] - predicted) < 1e-8) return;
    throw new Error(
      `trial ${trial}: the run predicted ${predictions.predicted[row]}, the refitted readout ${predicted}`,
    );
  }
  throw new Error(`trial ${trial} has no prediction`);
}

function inputOf(cell: CoverageCell, session: SignalSession, seed: number): ReadoutInput {
  const { nTrials, nUnits, k, repeats } = cell;
  const folds: FoldsSpec =
    cell.folds === 'stratified'
      ? { kind: 'stratified', k, repeats }
      : { kind: 'contiguous', k, purgeTrials: cell.hasDrift ? 5 : 0 };
  return {
    counts: session.counts,
    nTrials,
    nUnits,
    nBins: 1,
    binWidthMs: 1000,
    windowStartMs: 0,
    y: session.label,
    labelName: 'label',
    trialIndex: Int32Array.from({ length: nTrials }, (_, i) => i),
    unitIndex: Int32Array.from({ length: nUnits }, (_, i) => i),
    window: { startMs: 0, endMs: 1000 },
    features: 'windowMean',
    transform: 'none',
    estimator,
    folds,
    nuisance: { variables: [], handling: 'none' },
    nullScheme: { kind: 'none' },
    controls: [],
    views: [],
    seed,
  };
}
