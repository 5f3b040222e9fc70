import { labelSampler } from '@/lib/engine/controls/label-sampler';
import type { FoldSetup, NuisanceDesign, WideFeatures } from '@/lib/engine/crossval/fold-setup';
import { unpenalisedBase } from '@/lib/engine/estimators/unpenalised-base';
import { breakCorrelations } from '@/lib/engine/features/break-correlations';
import { buildFeatures, type Features } from '@/lib/engine/features/build-features';
import { labelStrata } from '@/lib/engine/features/label-strata';
import { innerAssignment } from '@/lib/engine/folds/inner-assignment';
import type { Linalg } from '@/lib/engine/linalg/port';
import { applyNuisance } from '@/lib/engine/nuisance/apply-nuisance';
import { fitNuisance } from '@/lib/engine/nuisance/fit-nuisance';
import { randomSubset } from '@/lib/engine/random/random-subset';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import { gatherLabels } from '@/lib/engine/readout/gather-labels';
import type {
  ChunkCache,
  EstimatorSpec,
  FeatureSpec,
  FoldSet,
  FoldSplit,
  NuisanceVariable,
  ReadoutInput,
  ReadoutPlan,
  Task,
} from '@/lib/engine/readout/types';

const DEFAULT_INNER_FOLDS = 5;
/** Strata of a continuous label, for the correlation-breaking shuffle. */
const SHUFFLE_QUANTILES = 6;

/** A task's observed labels by position. */
export function taskLabels(input: ReadoutInput, plan: ReadoutPlan, task: Task): Float64Array {
  return Float64Array.from(plan.foldSets[task.foldSet].trials, (trial) => input.y[trial]);
}

/** The nuisance variables that a task's design names. */
export function taskNuisance(input: ReadoutInput, task: Task): NuisanceVariable[] {
  if (task.design.nuisanceOf < 0) return input.nuisance.variables;
  const control = input.controls[task.design.nuisanceOf];
  return 'columns' in control ? control.columns : [];
}

/** Features of a task's trials, kept in the cache. */
export function taskFeatures(
  input: ReadoutInput,
  spec: FeatureSpec,
  trials: Int32Array,
  foldSet: number,
  cache: ChunkCache,
): Features {
  const key = `features ${foldSet} ${JSON.stringify({ ...spec, breakCorrelations: undefined })}`;
  const kept = cache.get(key) as Features | undefined;
  if (kept !== undefined) return kept;
  const features = buildFeatures(input, trials, spec);
  cache.set(key, features, features.x.byteLength);
  return features;
}

/**
 * What one split of a task is fitted from; `indices` tell inner folds of the same seed apart. Many features come in
 * blocks unless `isWhole` asks for all of them at once.
 */
export function taskSetup(
  input: ReadoutInput,
  plan: ReadoutPlan,
  task: Task,
  split: FoldSplit,
  cache: ChunkCache,
  indices: number[],
  isWhole = false,
): FoldSetup {
  const set = plan.foldSets[task.foldSet];
  const { trials } = set;
  const blocks = isWhole ? null : wideBlocks(input, task, split.train.length, trials.length);
  let features =
    blocks === null
      ? taskFeatures(input, task.features, trials, task.foldSet, cache)
      : { n: trials.length, p: blocks[blocks.length - 1].to, x: new Float64Array(0), columnsPerUnit: 1 };
  let xTest: Float64Array | undefined;
  if (task.features.breakCorrelations !== undefined) {
    const broken = brokenFeatures(input, set, features, split.repeat, cache, task);
    if (task.features.breakCorrelations === 'train') xTest = features.x;
    features = broken;
  }
  const limit = task.trainLimit;
  const train =
    limit === undefined || limit.size >= split.train.length
      ? split.train
      : randomSubset(
          split.train.length,
          limit.size,
          splitGenerator(input.seed, 'learning', limit.stream, split.repeat, split.fold),
        ).map((at) => split.train[at]);
  const estimator: EstimatorSpec =
    task.design.kind === 'nuisanceOnly' || task.features.kind === 'none'
      ? { kind: 'leastSquares' }
      : input.estimator;
  return {
    x: features.x,
    wide: blocks === null ? undefined : wideFeatures(input, task, trials, blocks),
    xTest,
    p: features.p,
    train,
    test: split.test,
    estimator,
    scaling: 'unit',
    trials,
    nuisance: nuisanceSetup(input, task, trials),
    inner: () => {
      if (split.inner !== undefined && train === split.train) {
        const k = split.inner.reduce((most, fold) => Math.max(most, fold + 1), 0);
        return { foldOf: split.inner, k, purgeTrials: 0 };
      }
      const y = Float64Array.from(train, (position) => input.y[trials[position]]);
      const own = Int32Array.from(train, (position) => trials[position]);
      return innerAssignment(y, own, input.folds, innerFolds(estimator), input.seed, ...indices);
    },
  };
}

/** Features times trials above which they are worked on in blocks, and features in a block. */
const WIDE_NUMBERS = 4e6;
const BLOCK_FEATURES = 1000;

/** Blocks of features where a task has many more of them than trials and its fit can be summed over them; else null. */
function wideBlocks(
  input: ReadoutInput,
  task: Task,
  nTrain: number,
  n: number,
): { from: number; to: number }[] | null {
  const { features, design } = task;
  const { estimator } = input;
  if (estimator.kind !== 'ridge' || design.kind !== 'plain' || features.breakCorrelations !== undefined)
    return null;
  if ('choose' in estimator.penalty && estimator.penalty.choose === 'innerFolds') return null;
  if ((features.kind !== 'windowMean' && features.kind !== 'bins') || !('all' in features.units)) return null;
  const width = Math.round((features.window.endMs - features.window.startMs) / input.binWidthMs);
  const perUnit = features.kind === 'bins' ? width : 1;
  const p = input.unitIndex.length * perUnit;
  if (p < nTrain || n * p < WIDE_NUMBERS) return null;
  const step = Math.max(1, Math.floor(BLOCK_FEATURES / perUnit)) * perUnit;
  return Array.from({ length: Math.ceil(p / step) }, (_, i) => ({
    from: i * step,
    to: Math.min(p, (i + 1) * step),
  }));
}

function wideFeatures(
  input: ReadoutInput,
  task: Task,
  trials: Int32Array,
  blocks: { from: number; to: number }[],
): WideFeatures {
  const perUnit = blocks[blocks.length - 1].to / input.unitIndex.length;
  return {
    blocks,
    features: ({ from, to }) => {
      const unitIndex = input.unitIndex.subarray(from / perUnit, to / perUnit);
      return buildFeatures({ ...input, unitIndex }, trials, task.features).x;
    },
  };
}

function innerFolds(estimator: EstimatorSpec): number {
  if (estimator.kind === 'leastSquares') return DEFAULT_INNER_FOLDS;
  const spec = estimator.kind === 'ridge' ? estimator.penalty : estimator.components;
  return 'value' in spec ? DEFAULT_INNER_FOLDS : (spec.innerFolds ?? DEFAULT_INNER_FOLDS);
}

function nuisanceSetup(input: ReadoutInput, task: Task, trials: Int32Array): FoldSetup['nuisance'] {
  if (task.design.kind === 'plain') return undefined;
  const variables = taskNuisance(input, task);
  const design = (train: Int32Array, test: Int32Array): NuisanceDesign => {
    const trialsOf = (positions: Int32Array): Int32Array => positions.map((position) => trials[position]);
    const fitted = fitNuisance(variables, trialsOf(train));
    return {
      cols: fitted.nColumns,
      train: applyNuisance(fitted, variables, trialsOf(train)).matrix,
      test: applyNuisance(fitted, variables, trialsOf(test)).matrix,
    };
  };
  return { design, order: task.design.kind === 'adjusted' ? 'residualiseFirst' : 'scaleFirst' };
}

function brokenFeatures(
  input: ReadoutInput,
  set: FoldSet,
  features: Features,
  repeat: number,
  cache: ChunkCache,
  task: Task,
): Features {
  const key = `broken ${task.foldSet} ${repeat} ${JSON.stringify({ ...task.features, breakCorrelations: undefined })}`;
  const kept = cache.get(key) as Features | undefined;
  if (kept !== undefined) return kept;
  const y = Float64Array.from(set.trials, (trial) => input.y[trial]);
  const strata = labelStrata(y, SHUFFLE_QUANTILES);
  const broken = breakCorrelations(features, strata, set.foldOf[repeat], input.seed, repeat);
  cache.set(key, broken, broken.x.byteLength);
  return broken;
}

/** Whole-session least-squares fit of the label on a task's nuisance variables: fitted values and residuals. */
export function nuisanceFit(
  input: ReadoutInput,
  plan: ReadoutPlan,
  task: Task,
  y: Float64Array,
  linalg: Linalg,
): { fitted: Float64Array; residual: Float64Array } {
  const { trials } = plan.foldSets[task.foldSet];
  const variables = taskNuisance(input, task);
  const design = fitNuisance(variables, trials);
  const { matrix } = applyNuisance(design, variables, trials);
  const { q, rank } = unpenalisedBase(matrix, y.length, matrix, y.length, design.nColumns, linalg);
  const k = new Float64Array(rank);
  const fitted = new Float64Array(y.length);
  linalg.gemm('none', 'none', 1, rank, y.length, 1, y, y.length, q, rank, 0, k, rank);
  linalg.gemm('none', 'transpose', 1, y.length, rank, 1, k, rank, q, rank, 0, fitted, y.length);
  return { fitted, residual: y.map((value, i) => value - fitted[i]) };
}

/**
 * Label draws from…to of a task as rows (by position). With nuisance beside the units the scheme of Freedman & Lane
 * (J. Bus. Econ. Stat. 1983): the residuals of the whole-session fit are shuffled and added back to the fitted values.
 *
 * Labels are always shuffled over all of the readout's trials; a task on part of them reads the same draws at its own
 * trials, so that overlapping parts see one label a trial.
 */
export function taskDraws(
  input: ReadoutInput,
  plan: ReadoutPlan,
  task: Task,
  from: number,
  to: number,
  linalg: Linalg,
  cache: ChunkCache,
): Float64Array {
  const whole = plan.foldSets[0];
  const all = sessionDraws(input, plan, { ...task, foldSet: 0 }, from, to, linalg, cache);
  if (task.foldSet === 0) return all;
  const at = new Map(Array.from(whole.trials, (trial, position) => [trial, position]));
  const positions = plan.foldSets[task.foldSet].trials.map((trial) => at.get(trial) ?? 0);
  return gatherLabels(all, to - from, whole.trials.length, positions);
}

function sessionDraws(
  input: ReadoutInput,
  plan: ReadoutPlan,
  task: Task,
  from: number,
  to: number,
  linalg: Linalg,
  cache: ChunkCache,
): Float64Array {
  const isFreedmanLane = task.design.kind === 'incremental' || task.design.kind === 'adjusted';
  const key = `draws ${isFreedmanLane ? task.design.nuisanceOf : 'labels'} ${from} ${to}`;
  const kept = cache.get(key) as Float64Array | undefined;
  if (kept !== undefined) return kept;
  const { trials } = plan.foldSets[0];
  const y = taskLabels(input, plan, task);
  const n = y.length;
  const parts = isFreedmanLane ? nuisanceFit(input, plan, task, y, linalg) : { fitted: null, residual: y };
  const sample = labelSampler(input.nullScheme, parts.residual, trials, input.seed, isFreedmanLane);
  const rows = new Float64Array((to - from) * n);
  for (let b = from; b < to; b++) {
    const at = (b - from) * n;
    sample(b, rows, at);
    if (parts.fitted !== null) for (let i = 0; i < n; i++) rows[at + i] += parts.fitted[i];
  }
  cache.set(key, rows, rows.byteLength);
  return rows;
}
