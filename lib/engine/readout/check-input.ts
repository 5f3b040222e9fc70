import { findBins } from '@/lib/engine/features/find-bins';
import { slideWindows } from '@/lib/engine/features/slide-windows';
import type { EngineProblem, EstimatorSpec, ReadoutInput, TimeWindow } from '@/lib/engine/readout/types';

/**
 * What is wrong with a readout's input before anything is planned: shapes, values, window edges, options.
 * Empty when nothing is. Cost O(trials + units); counts are checked by their number only.
 */
export function checkInput(input: ReadoutInput): EngineProblem[] {
  const problems: EngineProblem[] = [];
  const stop = (code: string, message: string, remedy: string, place: EngineProblem['place'] = {}): void => {
    problems.push({ code, severity: 'stops', message, remedy, place });
  };
  const { nTrials, nUnits, nBins, counts, y, trialIndex, unitIndex } = input;
  if (counts.length !== nTrials * nUnits * nBins) {
    stop(
      'shape-mismatch',
      `${counts.length} counts do not make ${nTrials} trials × ${nUnits} units × ${nBins} bins.`,
      'Bring the counts in again.',
    );
  }
  if (y.length !== nTrials) {
    stop(
      'shape-mismatch',
      `The label “${input.labelName}” has ${y.length} values for ${nTrials} trials.`,
      'Use a label with one value for each trial.',
    );
    return problems;
  }
  if (unitIndex.length === 0) stop('no-units', 'No unit is included.', 'Include at least one unit.');
  checkIndex(trialIndex, nTrials, 'trial', stop);
  checkIndex(unitIndex, nUnits, 'unit', stop);
  const missing = trialIndex.find((trial) => !Number.isFinite(y[trial]));
  if (missing !== undefined) {
    stop(
      'label-not-finite',
      `“${input.labelName}” has no finite value in trial ${missing + 1}.`,
      'Leave that trial out.',
      { trial: missing },
    );
  }
  const windows: [string, TimeWindow][] = [['window', input.window]];
  for (const control of input.controls)
    if (control.kind === 'window') windows.push(['control window', control]);
  for (const [name, window] of windows) {
    const range = findBins(window, input.windowStartMs, input.binWidthMs, nBins);
    if (!range.ok) stop('window-not-on-bins', range.message.replace('window', name), range.remedy);
  }
  for (const view of input.views) {
    if (view.kind !== 'timeCourse' && view.kind !== 'temporalGeneralisation') continue;
    const { widthMs, stepMs } = view;
    if (slideWindows(widthMs, stepMs, input.windowStartMs, input.binWidthMs, nBins) !== null) continue;
    stop(
      'windows-not-on-bins',
      `Windows of ${widthMs} ms every ${stepMs} ms cannot be made of ${nBins} bins of ${input.binWidthMs} ms.`,
      `Use multiples of ${input.binWidthMs} ms.`,
    );
  }
  checkEstimator(input.estimator, stop);
  checkNuisance(input, stop);
  if (!Number.isInteger(input.seed) || input.seed < 0 || input.seed > 4294967295) {
    stop(
      'seed-invalid',
      `The seed ${input.seed} is not a whole number from 0 to 4294967295.`,
      'Choose another seed.',
    );
  }
  return problems;
}

type Stop = (code: string, message: string, remedy: string, place?: EngineProblem['place']) => void;

function checkIndex(index: Int32Array, count: number, what: 'trial' | 'unit', stop: Stop): void {
  for (let i = 0; i < index.length; i++) {
    if (index[i] < 0 || index[i] >= count || (i > 0 && index[i] <= index[i - 1])) {
      stop(
        'index-invalid',
        `The included ${what}s must ascend from 0 to ${count - 1}; entry ${i} is ${index[i]}.`,
        `List each ${what} once, in order.`,
        { [what]: index[i] },
      );
      return;
    }
  }
}

function checkEstimator(estimator: EstimatorSpec, stop: Stop): void {
  if (estimator.kind === 'leastSquares') return;
  if (estimator.kind === 'ridge') {
    const { penalty } = estimator;
    if ('value' in penalty) {
      if (!(penalty.value >= 0) || !Number.isFinite(penalty.value))
        stop(
          'penalty-invalid',
          `The penalty ${penalty.value} is not a number of at least 0.`,
          'Choose a penalty of 0 or more.',
        );
    } else if (penalty.grid !== undefined) {
      const { from, to, count } = penalty.grid;
      if (
        !(from > 0) ||
        !(to > 0) ||
        !Number.isFinite(from) ||
        !Number.isFinite(to) ||
        !(count >= 2) ||
        !Number.isInteger(count)
      ) {
        stop(
          'penalty-grid-invalid',
          `A grid of ${count} penalties from ${from} to ${to} cannot be made.`,
          'Give two positive ends and at least two penalties.',
        );
      }
    }
    return;
  }
  const { components } = estimator;
  if (!('value' in components) && estimator.kind === 'pls' && components.choose === 'gcv') {
    stop(
      'gcv-needs-linear-fit',
      'Generalised cross-validation counts the degrees of freedom of a fit that is linear in the label; partial least squares is not.',
      'Choose the number of components by inner folds.',
    );
  }
}

function checkNuisance(input: ReadoutInput, stop: Stop): void {
  const variables = [...input.nuisance.variables];
  for (const control of input.controls) if ('columns' in control) variables.push(...control.columns);
  for (const { name, values } of variables) {
    if (values.length !== input.nTrials) {
      stop(
        'shape-mismatch',
        `The nuisance variable “${name}” has ${values.length} values for ${input.nTrials} trials.`,
        'Use a trial column.',
        { column: name },
      );
      continue;
    }
    const missing = input.trialIndex.find((trial) => !Number.isFinite(values[trial]));
    if (missing !== undefined) {
      stop(
        'nuisance-missing',
        `“${name}” has no value in trial ${missing + 1}, which takes part.`,
        'Leave that trial out.',
        { trial: missing, column: name },
      );
    }
  }
}
