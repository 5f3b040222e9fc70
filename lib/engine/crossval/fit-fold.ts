import type { FactoredFold, Chooser, FoldFit } from '@/lib/engine/crossval/fold-fit';
import { factorWide } from '@/lib/engine/crossval/factor-wide';
import type { FoldSetup, WideFeatures } from '@/lib/engine/crossval/fold-setup';
import { screenPlan, type ScreenPlan } from '@/lib/engine/crossval/screen-plan';
import { type Candidate, componentCandidate, ridgeCandidate } from '@/lib/engine/estimators/candidates';
import { closedFormWeights } from '@/lib/engine/estimators/closed-form-weights';
import { penaltyGrid } from '@/lib/engine/estimators/penalty-grid';
import { residualise } from '@/lib/engine/estimators/residualise';
import { spectralFactor } from '@/lib/engine/estimators/spectral-factor';
import { unpenalisedBase } from '@/lib/engine/estimators/unpenalised-base';
import { standardise, type Standardised } from '@/lib/engine/features/standardise';
import { splitPositions } from '@/lib/engine/folds/split-positions';
import type { Linalg } from '@/lib/engine/linalg/port';
import type { EstimatorSpec } from '@/lib/engine/readout/types';

/** The largest number of components to try where the recipe names none. */
const DEFAULT_MAX_COMPONENTS = 20;

/**
 * Fits everything of one fold that no label enters: scaling, nuisance basis, factorisation, candidates, and what the
 * choice among them needs. Any number of labels can then be evaluated by `evaluateLabels`.
 *
 * Held-out rows influence nothing but their own predictions. `setup` is left alone.
 * Throws EngineError from the nuisance design. Cost: one factorisation, and one more for each inner fold.
 */
export function fitFold(setup: FoldSetup, linalg: Linalg): FoldFit {
  const { estimator, train, p } = setup;
  const penalties =
    estimator.kind === 'ridge' ? penaltyGrid(estimator.penalty, train.length, p) : Float64Array.of(0);
  const outer =
    setup.wide === undefined
      ? factorFold(setup, setup.train, setup.test, penalties, null, linalg)
      : { fit: wideFold(setup, setup.wide, penalties, linalg), scaled: null };
  const choice = choiceOf(estimator);
  let chooser: Chooser = { kind: 'fixed' };
  const isInner = choice === 'innerFolds' || (choice === 'leaveOneOut' && estimator.kind !== 'ridge');
  if (choice !== null && isInner && outer.scaled !== null) {
    chooser = { kind: 'inner', folds: innerFits(setup, penalties, outer.scaled, choice, linalg) };
  } else if (choice !== null && choice !== 'innerFolds' && outer.fit.candidates.length > 1) {
    const { factor, base, candidates } = outer.fit;
    const weights = closedFormWeights(factor, base, candidates, choice, linalg);
    let screen: ScreenPlan | null | undefined;
    const makeScreen = (): ScreenPlan | null => {
      if (screen === undefined)
        screen = estimator.kind === 'ridge' ? screenPlan(factor, candidates, weights) : null;
      return screen;
    };
    chooser = { kind: 'closedForm', weights, screen: makeScreen };
  }
  const fit: FoldFit = { ...outer.fit, chooser, isGrid: choice !== null, p, bytes: 0 };
  fit.bytes = bytesOf(fit);
  return fit;
}

function wideFold(
  setup: FoldSetup,
  wide: WideFeatures,
  penalties: Float64Array,
  linalg: Linalg,
): FactoredFold {
  const found = factorWide(setup, wide, penalties[penalties.length - 1], linalg);
  const freedom = setup.train.length - 1;
  const candidates = Array.from(penalties, (penalty) =>
    ridgeCandidate(found.factor, penalty, setup.p, freedom),
  );
  return { ...found, base: null, candidates, plsComponents: 0 };
}

function choiceOf(estimator: EstimatorSpec): 'leaveOneOut' | 'gcv' | 'innerFolds' | null {
  if (estimator.kind === 'leastSquares') return null;
  const spec = estimator.kind === 'ridge' ? estimator.penalty : estimator.components;
  return 'value' in spec ? null : spec.choose;
}

function factorFold(
  setup: FoldSetup,
  train: Int32Array,
  test: Int32Array,
  penalties: Float64Array,
  fixedScaling: Standardised | null,
  linalg: Linalg,
): { fit: FactoredFold; scaled: Standardised } {
  const { nuisance, estimator, p } = setup;
  let scaled: Standardised;
  let base = null;
  if (nuisance === undefined) {
    scaled =
      fixedScaling === null
        ? standardise(setup.x, p, train, test, setup.scaling, setup.xTest)
        : recentre(setup, fixedScaling, train, test);
  } else {
    const design = nuisance.design(train, test);
    base = unpenalisedBase(design.train, train.length, design.test, test.length, design.cols, linalg);
    if (nuisance.order === 'scaleFirst') {
      scaled = standardise(setup.x, p, train, test, setup.scaling, setup.xTest);
      residualise(scaled.zTrain, train.length, scaled.zTest, test.length, scaled.p, base, linalg);
    } else {
      const raw = standardise(setup.x, p, train, test, 'none', setup.xTest);
      residualise(raw.zTrain, train.length, raw.zTest, test.length, raw.p, base, linalg);
      scaled = rescale(raw);
    }
  }
  // Partial least squares never divides by an eigenvalue, so that the Gram matrix's digits are enough for it.
  const smallest =
    estimator.kind === 'ridge' ? penalties[penalties.length - 1] : estimator.kind === 'pls' ? Infinity : 0;
  const { zTrain, zTest } = scaled;
  const factor = spectralFactor(zTrain, train.length, zTest, test.length, scaled.p, smallest, linalg);
  const freedom = Math.max(0, train.length - (base?.rank ?? 1));
  const most = Math.min(scaled.p, freedom);
  let candidates: Candidate[];
  let plsComponents = 0;
  if (estimator.kind === 'pcr' || estimator.kind === 'pls') {
    const spec = estimator.components;
    const numbers =
      'value' in spec
        ? [spec.value]
        : Array.from({ length: spec.max ?? DEFAULT_MAX_COMPONENTS }, (_, i) => i + 1);
    const empty = new Float64Array(0);
    candidates = numbers.map((k) =>
      estimator.kind === 'pcr'
        ? componentCandidate(factor, Math.min(k, most), p, freedom)
        : { penalty: null, components: Math.min(k, most), fit: empty, predict: empty },
    );
    if (estimator.kind === 'pls') plsComponents = Math.min(Math.max(...numbers), most);
  } else {
    candidates = Array.from(penalties, (penalty) => ridgeCandidate(factor, penalty, p, freedom));
    if (estimator.kind === 'leastSquares') candidates[0].penalty = null;
  }
  const { kept, mean, sd } = scaled;
  const scaledTrain = setup.keepsScaled === true ? zTrain : undefined;
  return { fit: { factor, base, candidates, plsComponents, scaledTrain, kept, mean, sd }, scaled };
}

/** Training rows scaled as the outer fold did, then centred on these training rows (explicit leave-one-out). */
function recentre(setup: FoldSetup, outer: Standardised, train: Int32Array, test: Int32Array): Standardised {
  const scaled = standardise(setup.x, setup.p, train, test, 'none', setup.xTest);
  const sdOf = new Map(Array.from(outer.kept, (feature, j) => [feature, outer.sd[j]]));
  const sd = Float64Array.from(scaled.kept, (feature) => sdOf.get(feature) ?? 1);
  for (const z of [scaled.zTrain, scaled.zTest]) {
    for (let i = 0; i < z.length; i++) z[i] /= sd[i % scaled.p];
  }
  return { ...scaled, sd };
}

/** z-scores features that are already centred, and drops those that the nuisance explained. */
function rescale(raw: Standardised): Standardised {
  const all = Int32Array.from({ length: raw.nTrain }, (_, i) => i);
  const both = new Float64Array(raw.zTrain.length + raw.zTest.length);
  both.set(raw.zTrain);
  both.set(raw.zTest, raw.zTrain.length);
  const held = Int32Array.from({ length: raw.nTest }, (_, i) => raw.nTrain + i);
  const scaled = standardise(both, raw.p, all, held);
  return {
    ...scaled,
    kept: scaled.kept.map((j) => raw.kept[j]),
    mean: Float64Array.from(scaled.kept, (j) => raw.mean[j]),
  };
}

function innerFits(
  setup: FoldSetup,
  penalties: Float64Array,
  outerScaling: Standardised,
  choice: 'leaveOneOut' | 'gcv' | 'innerFolds',
  linalg: Linalg,
): { train: Int32Array; test: Int32Array; fit: FactoredFold }[] {
  const nTrain = setup.train.length;
  const isLeaveOneOut = choice === 'leaveOneOut';
  const assignment = isLeaveOneOut
    ? { foldOf: Int32Array.from({ length: nTrain }, (_, i) => i), k: nTrain, purgeTrials: 0 }
    : setup.inner?.();
  if (assignment === undefined) throw new RangeError('the choice by inner folds needs inner folds');
  const trials = Int32Array.from(setup.train, (row) => setup.trials[row]);
  const folds = [];
  for (let fold = 0; fold < assignment.k; fold++) {
    const { train, test } = splitPositions(assignment.foldOf, [fold], trials, assignment.purgeTrials);
    if (train.length < 2 || test.length === 0) continue;
    const rowsOf = (positions: Int32Array): Int32Array => positions.map((i) => setup.train[i]);
    const xOnly: FoldSetup = { ...setup, xTest: undefined };
    const { fit } = factorFold(
      xOnly,
      rowsOf(train),
      rowsOf(test),
      penalties,
      isLeaveOneOut ? outerScaling : null,
      linalg,
    );
    folds.push({ train, test, fit });
  }
  return folds;
}

function bytesOf(fit: FoldFit): number {
  const one = (f: FactoredFold): number =>
    8 *
      (1.5 * f.factor.left.length +
        f.factor.test.length +
        (f.factor.directions?.length ?? 0) +
        3 * f.kept.length) +
    f.candidates.reduce((sum, c) => sum + 16 * c.fit.length, 0);
  const inner = fit.chooser.kind === 'inner' ? fit.chooser.folds.reduce((sum, f) => sum + one(f.fit), 0) : 0;
  const weights =
    fit.chooser.kind === 'closedForm'
      ? fit.chooser.weights.reduce((sum, w) => sum + 8 * (w?.length ?? 0), 0)
      : 0;
  return one(fit) + inner + weights;
}
