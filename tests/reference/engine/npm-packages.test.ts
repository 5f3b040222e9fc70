import { getFolds } from 'ml-cross-validation';
import MultivariateLinearRegression from 'ml-regression-multivariate-linear';
import { expect, it } from 'vitest';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { runReadout } from '@/lib/engine/readout/run-readout';
import { openNativeLinalg } from '@/lib/native/open-linalg';
import { makeInput } from '@/tests/unit/engine/make-input';

/* Outside reference: npm's ml-cross-validation 1.3.0 splits the trials, ml-regression-multivariate-linear 2.0.4 fits them. */

it.each([
  ['OpenBLAS', openNativeLinalg()],
  ['portable', portableLinalg],
] as const)('least squares holds out what two packages of npm hold out, %s', (_name, linalg) => {
  const nTrials = 103; // not a multiple of the number of folds
  const folds = getFolds(Array.from({ length: nTrials }), 5);
  const assignment = new Int32Array(nTrials).fill(-1);
  folds.forEach(({ testIndex }, fold) => testIndex.forEach((trial) => (assignment[trial] = fold)));
  const input = makeInput(
    { nTrials, nUnits: 7 },
    {
      estimator: { kind: 'leastSquares' },
      folds: { kind: 'given', assignment: [assignment] },
      nullScheme: { kind: 'none' },
    },
  );
  const seconds = (input.nBins * input.binWidthMs) / 1000;
  const rates = Array.from({ length: nTrials }, (_, trial) =>
    Array.from({ length: input.nUnits }, (_unused, unit) => {
      let spikes = 0;
      for (let bin = 0; bin < input.nBins; bin += 1)
        spikes += input.counts[(trial * input.nUnits + unit) * input.nBins + bin];
      return spikes / seconds;
    }),
  );
  const result = runReadout(input, linalg ?? portableLinalg);
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  const { perFold, predictions } = result.numbers;
  const ours = new Map(Array.from(predictions.trial, (trial, i) => [trial, predictions.predicted[i]]));
  folds.forEach(({ trainIndex, testIndex }, fold) => {
    const model = new MultivariateLinearRegression(
      trainIndex.map((trial) => rates[trial]),
      trainIndex.map((trial) => [input.y[trial]]),
    );
    expect(perFold[fold].nTrain).toBe(trainIndex.length);
    expect(perFold[fold].nTest).toBe(testIndex.length);
    for (const trial of testIndex)
      expect(Math.abs(ours.get(trial)! - model.predict(rates[trial])[0])).toBeLessThan(1e-10);
  });
  expect(ours.size).toBe(nTrials);
});
