import { z } from 'zod';
import { idSchema, instantSchema, sha256Schema } from './common';
import { problemSchema } from './problem';
import { recipeInputSchema, recipeSchema } from './recipe';

export const createReadoutSchema = z.strictObject({ recipe: recipeInputSchema });
export type CreateReadout = z.infer<typeof createReadoutSchema>;

export const readoutStateSchema = z.enum(['queued', 'running', 'done', 'failed', 'cancelled']);
export type ReadoutState = z.infer<typeof readoutStateSchema>;

export const progressSchema = z.strictObject({
  done: z.number(),
  total: z.number(),
  phase: z.string(),
  secondsLeft: z.number().nullable(),
});
export type Progress = z.infer<typeof progressSchema>;

/** null where the value cannot be worked out; never NaN or Infinity. */
const num = z.number().nullable();
export const intervalSchema = z.strictObject({
  low: z.number(),
  high: z.number(),
  level: z.number(),
  method: z.string(),
});
export type Interval = z.infer<typeof intervalSchema>;

export const heldOutSchema = z.strictObject({
  r2: num,
  /** Nested cross-validation interval (Bates, Hastie & Tibshirani): covers the fitted readouts' R². */
  r2Interval: intervalSchema.nullable(),
  /** BCa over held-out trials (or blocks) with the readouts held fixed. */
  testTrialInterval: intervalSchema.nullable(),
  r: num,
  rho: num,
  rmse: num,
  mae: num,
  calibrationSlope: num,
  calibrationIntercept: num,
  nTrials: z.int(),
  effectiveTrials: num,
});
export type HeldOut = z.infer<typeof heldOutSchema>;

export const foldResultSchema = z.strictObject({
  repeat: z.int(),
  fold: z.int(),
  nTrain: z.int(),
  nTest: z.int(),
  nPurged: z.int(),
  droppedFeatures: z.int(),
  penalty: num,
  components: z.int().nullable(),
  atGridEdge: z.boolean(),
  r2: num,
  rmse: num,
});
export const levelResultSchema = z.strictObject({
  level: z.number(),
  nTrials: z.int(),
  meanPredicted: num,
  sdPredicted: num,
  bias: num,
  meanInterval: intervalSchema.nullable(),
});
export const nullResultSchema = z.strictObject({
  kind: z.string(),
  draws: z.int(),
  exceedances: z.int(),
  p: num,
  smallestP: num,
  quantiles: z.strictObject({ q025: num, q05: num, q50: num, q95: num, q975: num, max: num }),
  /** Held-out R² of every draw, in draw order. */
  values: z.array(z.number()).optional(),
});
export const controlResultSchema = z.strictObject({
  kind: z.string(),
  question: z.string(),
  heldOut: z.looseObject({}).nullable(),
  null: nullResultSchema.nullable(),
  outcome: z.enum(['survives', 'fails', 'cannotTell']),
  sentence: z.string(),
  detail: z.looseObject({}).optional(),
});
export const verdictSchema = z.strictObject({
  kind: z.enum(['carries', 'doesNot', 'cannotTell', 'explained', 'worse']),
  sentence: z.string(),
  /** Parts of the sentence that are the answer, drawn in bold. */
  strong: z.array(z.string()),
});
export type Verdict = z.infer<typeof verdictSchema>;
export const resultSchema = z.strictObject({
  heldOut: heldOutSchema,
  perFold: z.array(foldResultSchema),
  perLevel: z.array(levelResultSchema),
  penalty: z.array(num),
  null: nullResultSchema.nullable(),
  controls: z.array(controlResultSchema),
  views: z.array(z.looseObject({ kind: z.string() })),
  warnings: z.array(problemSchema),
  counts: z.strictObject({
    trialsAll: z.int(),
    trialsUsed: z.int(),
    trialsExcluded: z.int(),
    trialsMissing: z.int(),
    unitsAll: z.int(),
    unitsUsed: z.int(),
    features: z.int(),
  }),
  verdict: verdictSchema,
});
export type ReadoutResult = z.infer<typeof resultSchema>;

/** Enough to get the same numbers again. */
export const provenanceSchema = z.strictObject({
  dataHash: sha256Schema,
  dataVersion: z.int(),
  recipeHash: sha256Schema,
  seed: z.int(),
  engineVersion: z.string(),
  backend: z.string(),
  libraries: z.record(z.string(), z.string()),
  coreType: z.string(),
  startedAt: instantSchema,
  finishedAt: instantSchema,
  durationMs: z.number(),
  computeMs: z.number(),
  attempts: z.int(),
});
export type Provenance = z.infer<typeof provenanceSchema>;

export const readoutSchema = z.strictObject({
  id: idSchema,
  sessionId: idSchema,
  number: z.int().positive(),
  state: readoutStateSchema,
  progress: progressSchema.nullable(),
  recipe: recipeSchema,
  result: resultSchema.nullable(),
  provenance: provenanceSchema.nullable(),
  problems: z.array(problemSchema),
  authorId: idSchema,
  authorName: z.string(),
  createdAt: instantSchema,
  finishedAt: instantSchema.nullable(),
});
export type Readout = z.infer<typeof readoutSchema>;

/** A ledger line. */
export const readoutSummarySchema = z.strictObject({
  id: idSchema,
  number: z.int().positive(),
  state: readoutStateSchema,
  label: z.string(),
  recipeLine: z.string(),
  r2: num,
  r2Interval: intervalSchema.nullable(),
  nullInterval: z.strictObject({ low: z.number(), high: z.number() }).nullable(),
  p: num,
  verdictKind: verdictSchema.shape.kind.nullable(),
  statusLine: z.string(),
  dataVersion: z.int(),
  authorName: z.string(),
  createdAt: instantSchema,
});
export type ReadoutSummary = z.infer<typeof readoutSummarySchema>;

export const predictionSchema = z.strictObject({
  window: z.int(),
  repeat: z.int(),
  fold: z.int(),
  trial: z.int(),
  label: z.number(),
  predicted: z.number(),
});
export type Prediction = z.infer<typeof predictionSchema>;

/** What the event stream sends: a session's or readout's state and progress. */
export const liveEventSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('readout'),
    sessionId: idSchema,
    readoutId: idSchema,
    state: readoutStateSchema,
    progress: progressSchema.nullable(),
  }),
  z.strictObject({ kind: z.literal('session'), sessionId: idSchema, state: z.string() }),
  z.strictObject({ kind: z.literal('file'), sessionId: idSchema, fileId: idSchema, state: z.string() }),
]);
export type LiveEvent = z.infer<typeof liveEventSchema>;

/** What a recipe would take. `recipe` has every default filled in; with problems that stop it there is no estimate. */
export const readoutEstimateSchema = z.strictObject({
  recipe: recipeSchema,
  seconds: num,
  bytes: num,
  trials: z.int().nullable(),
  units: z.int().nullable(),
  problems: z.array(problemSchema),
});
export type ReadoutEstimate = z.infer<typeof readoutEstimateSchema>;
