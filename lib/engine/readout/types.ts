/**
 * What goes into a readout and what comes out of it, as plain data.
 *
 * Conventions. "Trial" counts the session's trials from 0 (0…nTrials−1); "position" counts the included trials
 * (0…n−1, in ascending trial order). Per-trial arrays in `ReadoutInput` run over all of the session's trials;
 * given permutations run over positions. All of it may be structured-cloned, or lie in SharedArrayBuffers.
 */

export type CountsArray = Uint8Array | Uint16Array | Uint32Array | Int32Array;

/** A fault or remark in words; has the shape of the product's problems. */
export interface EngineProblem {
  code: string;
  severity: 'stops' | 'warns' | 'notes';
  message: string;
  remedy?: string;
  place: { trial?: number; unit?: number; bin?: number; fold?: number; column?: string };
}

/** A half-open span of time [startMs, endMs) relative to the alignment event. */
export interface TimeWindow {
  startMs: number;
  endMs: number;
}

/** How a penalty or a number of components is chosen on the training trials. */
export interface ChoiceSpec {
  choose: 'leaveOneOut' | 'gcv' | 'innerFolds';
  /** Number of inner folds; 5 where left out. */
  innerFolds?: number;
}

export type PenaltySpec =
  | { value: number }
  /** `grid`: `count` penalties evenly spaced in log λ from `from` to `to`, used unscaled; left out: max(n_train, p)·10^g, g = −4…4, 25 values. */
  | (ChoiceSpec & { grid?: { from: number; to: number; count: number } });

export type ComponentsSpec =
  | { value: number }
  /** Chosen among 1 … `max` (20 where left out); numbers beyond what a training set allows act as the largest that it does. */
  | (ChoiceSpec & { max?: number });

export type EstimatorSpec =
  | { kind: 'leastSquares' }
  | { kind: 'ridge'; penalty: PenaltySpec }
  | { kind: 'pcr'; components: ComponentsSpec }
  | { kind: 'pls'; components: ComponentsSpec };

export type FoldsSpec =
  | { kind: 'stratified'; k: number; repeats: number }
  | { kind: 'contiguous'; k: number; purgeTrials: number }
  /** `group`: one code a trial of the session; `names[code]` is what people call it. */
  | { kind: 'leaveOneGroupOut'; group: Int32Array; names?: string[] }
  /**
   * `assignment[repeat][trial]` is the fold, −1 where the trial takes no part.
   * `inner[repeat][fold][trial]` is the inner fold of a training trial (−1 elsewhere), for the choice by inner folds.
   */
  | { kind: 'given'; assignment: Int32Array[]; inner?: Int32Array[][] };

/** One nuisance variable. `values` runs over the session's trials; category codes are 0, 1 … . */
export interface NuisanceVariable {
  name: string;
  term: 'linear' | 'quadratic' | 'spline' | 'category';
  values: Float64Array;
  /** Set for a circular variable in degrees: it enters as cosine and sine of 360°·value/periodDeg. */
  periodDeg?: number;
}

export type NullSpec =
  | { kind: 'none' }
  | { kind: 'free'; draws: number }
  | { kind: 'within'; codes: Int32Array; draws: number }
  | { kind: 'groups'; codes: Int32Array; draws: number }
  | { kind: 'circularShift'; draws: number }
  /** Label sequences of other sessions of the same design, each in its own trial order. */
  | { kind: 'sessions'; sequences: Float64Array[] }
  /** `permutations[b]` indexes positions: y*[i] = y[permutations[b][i]]. */
  | { kind: 'given'; permutations: Int32Array[] };

export type ControlSpec =
  | { kind: 'nuisanceOnly' | 'incremental' | 'adjusted'; columns: NuisanceVariable[] }
  | { kind: 'totalRate' }
  | { kind: 'rateNormalised' }
  | { kind: 'trialOrder' }
  | { kind: 'window'; startMs: number; endMs: number }
  /** `values`: the nuisance to match (cut at its quartiles), or category codes when `isCategory`. */
  | { kind: 'matched'; column: string; values: Float64Array; isCategory: boolean; draws: number }
  | { kind: 'breakCorrelations'; scope: 'train' | 'all' }
  /** `side[trial]`: 0 train, 1 test, −1 neither. */
  | { kind: 'generalise'; column: string; side: Int8Array; trainNames: string[]; testNames: string[] }
  | { kind: 'injection'; sizes: number[]; draws: number };

export type ViewSpec =
  | { kind: 'timeCourse' | 'temporalGeneralisation'; widthMs: number; stepMs: number }
  | { kind: 'populationSize' | 'learning'; sizes: number[]; draws: number }
  | { kind: 'singleUnits' }
  | { kind: 'weights' };

/** Everything that determines a readout's numbers. */
export interface ReadoutInput {
  /** nTrials × nUnits × nBins, row-major: count (t, u, b) is counts[(t·nUnits + u)·nBins + b]. */
  counts: CountsArray;
  nTrials: number;
  nUnits: number;
  nBins: number;
  binWidthMs: number;
  /** Left edge of bin 0 of `counts`, in ms relative to the alignment event. */
  windowStartMs: number;
  /** The label over the session's trials; finite at every included trial. */
  y: Float64Array;
  /** Name of the label, for messages. */
  labelName: string;
  /** Included trials, ascending. */
  trialIndex: Int32Array;
  /** Included units, ascending. */
  unitIndex: Int32Array;
  window: TimeWindow;
  features: 'windowMean' | 'bins';
  transform: 'none' | 'sqrt';
  estimator: EstimatorSpec;
  folds: FoldsSpec;
  nuisance: { variables: NuisanceVariable[]; handling: 'none' | 'adjust' };
  nullScheme: NullSpec;
  controls: ControlSpec[];
  views: ViewSpec[];
  /** 0…2³²−1. */
  seed: number;
}

/** A part of the work that can run in any thread, in any order, with the same bits. */
export interface Chunk {
  id: number;
  /** What people read while it runs: "Held-out predictions", "Shuffled control", "Interval" … . */
  phase: string;
  /** Estimated work in flops, for progress. */
  weight: number;
  /** Chunks that share this share intermediate results: run them on the same thread where that costs nothing. */
  affinity: string;
  job: ChunkJob;
}

/**
 * Which piece a chunk is. `task` indexes ReadoutPlan.tasks, `split` that task's fold set, `from`…`to` is half-open.
 * - observed: held-out predictions for the observed labels.
 * - draws: squared errors for label draws from…to.
 * - pair: predictions of both folds from the trials of neither (nested cross-validation interval).
 * - batch: held-out R² of tasks from…to, all splits of each (many small analyses).
 * - weights: weights and patterns of one split.
 * - generalisation: readouts trained in windows from…to, tested in all windows.
 * - injection: one generated session of a given size.
 */
export type ChunkJob =
  | { kind: 'observed'; task: number; split: number }
  | { kind: 'draws'; task: number; split: number; from: number; to: number }
  | { kind: 'pair'; task: number; repeat: number; foldA: number; foldB: number }
  | { kind: 'weights'; task: number; split: number }
  | { kind: 'batch'; from: number; to: number }
  | { kind: 'generalisation'; view: number; split: number; from: number; to: number }
  | { kind: 'injection'; control: number; size: number; draw: number };

/** What a chunk gives back: named numbers and typed arrays only, so that it may be stored, sent or cloned. */
export interface ChunkOutput {
  id: number;
  values: Record<string, number | Float64Array | Int32Array>;
}

/** Intermediate results of one thread (features, factorisations); purely a saving: a cold cache gives the same bits. */
export interface ChunkCache {
  get(key: string): unknown;
  set(key: string, value: unknown, bytes: number): void;
}

/** Training and test positions of one fold of one repeat. */
export interface FoldSplit {
  repeat: number;
  /** Held-out fold; −1 where a split is not one of the folds. */
  fold: number;
  train: Int32Array;
  test: Int32Array;
  /** Trials left out of training by the purge gap. */
  nPurged: number;
  /** Inner fold of each training trial (parallel to `train`), where inner folds were given. */
  inner?: Int32Array;
}

/** One analysis over all folds: the readout itself, or one that a control or a view needs. */
export interface Task {
  /** "main", "control 2", "view 0 window 13" … . */
  name: string;
  /** Index into the input's controls or views; −1 for neither. */
  control: number;
  view: number;
  /** Window, size, draw … within that control or view. */
  item: number;
  features: FeatureSpec;
  design: DesignSpec;
  /** Number of label draws of the null that this task takes part in; 0 for none. */
  draws: number;
  /** Splits to use: index into ReadoutPlan.foldSets. */
  foldSet: number;
  /** Train on a random part of each split's training trials (learning curve). */
  trainLimit?: { size: number; stream: number };
}

/** Which numbers of a trial become its features. */
export interface FeatureSpec {
  kind: 'windowMean' | 'bins' | 'totalRate' | 'rateNormalised' | 'trialOrder' | 'none';
  window: TimeWindow;
  transform: 'none' | 'sqrt';
  /** Units to use, or how to draw a random subset of the included ones. */
  units: { all: true } | { one: number } | { subset: { size: number; stream: number } };
  /** Permute each unit's trials within label level and fold. */
  breakCorrelations?: 'train' | 'all';
}

/** What stands beside the features, unpenalised. */
export interface DesignSpec {
  kind: 'plain' | 'nuisanceOnly' | 'incremental' | 'adjusted';
  /** Index of the control that names the nuisance variables; −1: the recipe's own. */
  nuisanceOf: number;
}

/** Splits that several tasks share. */
export interface FoldSet {
  /** Trials (of the session) that take part, ascending; positions index this. */
  trials: Int32Array;
  nRepeats: number;
  nFolds: number;
  /** Session trials that training keeps away from held-out ones. */
  purgeTrials: number;
  /** Each position's fold, one array a repeat. */
  foldOf: Int32Array[];
  splits: FoldSplit[];
}

export interface ReadoutPlan {
  foldSets: FoldSet[];
  tasks: Task[];
  chunks: Chunk[];
  /** Draws of the shuffled control after all limits (for example n − 1 circular shifts). */
  nDraws: number;
  /** ln of the number of distinct label arrangements under the scheme; null where it is not known. */
  logArrangements: number | null;
  warnings: EngineProblem[];
  /** `seconds`: on one core of this century's servers with the native backend. `bytes`: peak of one thread, without the input. */
  estimate: { flops: number; bytes: number; seconds: number };
}

export type PlanResult = { ok: true; plan: ReadoutPlan } | { ok: false; problems: EngineProblem[] };

export interface IntervalNumbers {
  low: number;
  high: number;
  level: number;
  method: string;
}

export interface HeldOutNumbers {
  r2: number | null;
  r2Interval: IntervalNumbers | null;
  testTrialInterval: IntervalNumbers | null;
  r: number | null;
  rho: number | null;
  rmse: number | null;
  mae: number | null;
  calibrationSlope: number | null;
  calibrationIntercept: number | null;
  nTrials: number;
  effectiveTrials: number | null;
}

export interface FoldNumbers {
  repeat: number;
  fold: number;
  nTrain: number;
  nTest: number;
  nPurged: number;
  droppedFeatures: number;
  penalty: number | null;
  components: number | null;
  atGridEdge: boolean;
  r2: number | null;
  rmse: number | null;
}

export interface LevelNumbers {
  level: number;
  nTrials: number;
  meanPredicted: number | null;
  sdPredicted: number | null;
  bias: number | null;
  meanInterval: IntervalNumbers | null;
}

export interface NullNumbers {
  kind: string;
  draws: number;
  exceedances: number;
  p: number | null;
  smallestP: number | null;
  quantiles: {
    q025: number | null;
    q05: number | null;
    q50: number | null;
    q95: number | null;
    q975: number | null;
    max: number | null;
  };
  /** Held-out R² of every draw, in draw order. */
  values: number[];
}

export interface ControlNumbers {
  kind: string;
  question: string;
  heldOut: Record<string, number | string | null> | null;
  null: NullNumbers | null;
  outcome: 'survives' | 'fails' | 'cannotTell';
  sentence: string;
  detail: Record<string, unknown>;
}

export interface ViewNumbers {
  kind: string;
  [key: string]: unknown;
}

/** One row a held-out trial (and repeat); parallel arrays. `trial` counts the session's trials. */
export interface PredictionColumns {
  window: Int32Array;
  repeat: Int32Array;
  fold: Int32Array;
  trial: Int32Array;
  label: Float64Array;
  predicted: Float64Array;
}

export interface ReadoutNumbers {
  heldOut: HeldOutNumbers;
  perFold: FoldNumbers[];
  perLevel: LevelNumbers[];
  /** Chosen λ of each fold (or null where the estimator has none). */
  penalty: (number | null)[];
  null: NullNumbers | null;
  controls: ControlNumbers[];
  views: ViewNumbers[];
  warnings: EngineProblem[];
  /** Features a trial, before any is dropped. */
  nFeatures: number;
  /** Trials that took part. */
  trialsUsed: Int32Array;
  predictions: PredictionColumns;
}
