import { z } from 'zod';
import { idSchema, sha256Schema } from './common';

const opSchema = z.enum(['=', '!=', '<', '<=', '>', '>=', 'in']);
const conditionSchema = z.strictObject({
  column: z.string(),
  op: opSchema,
  value: z.union([z.number(), z.string(), z.array(z.union([z.number(), z.string()]))]),
});
export type Condition = z.infer<typeof conditionSchema>;
const indexSchema = z.int().nonnegative();

const trialsChoiceSchema = z.union([
  z.strictObject({ all: z.literal(true) }),
  z.strictObject({ where: z.array(conditionSchema).min(1) }),
  z.strictObject({ ids: z.array(indexSchema).min(1) }),
]);
/** A unit rule looks at rates, presence and unit columns only, never at the label. */
const unitRuleSchema = z.strictObject({
  minRateHz: z.number().nonnegative().optional(),
  minPresence: z.number().min(0).max(1).optional(),
  where: z.array(conditionSchema).optional(),
});
const unitsChoiceSchema = z.union([
  z.strictObject({ all: z.literal(true) }),
  z.strictObject({ rule: unitRuleSchema }),
  z.strictObject({ ids: z.array(indexSchema).min(1) }),
]);

const gridSchema = z.strictObject({
  from: z.number().positive(),
  to: z.number().positive(),
  count: z.int().min(2).max(200),
});
const penaltySchema = z.union([
  z.strictObject({ value: z.number().nonnegative() }),
  z.strictObject({
    choose: z.enum(['leaveOneOut', 'gcv', 'innerFolds']),
    innerFolds: z.int().min(2).max(50).optional(),
    grid: gridSchema.optional(),
  }),
]);
const componentsSchema = z.union([
  z.strictObject({ value: z.int().positive() }),
  z.strictObject({
    choose: z.enum(['leaveOneOut', 'gcv', 'innerFolds']),
    innerFolds: z.int().min(2).max(50).optional(),
    max: z.int().positive().optional(),
  }),
]);
export const estimatorSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('leastSquares') }),
  z.strictObject({ kind: z.literal('ridge'), penalty: penaltySchema.default({ choose: 'leaveOneOut' }) }),
  z.strictObject({ kind: z.literal('pcr'), components: componentsSchema.default({ choose: 'innerFolds' }) }),
  z.strictObject({ kind: z.literal('pls'), components: componentsSchema.default({ choose: 'innerFolds' }) }),
]);
export type EstimatorRecipe = z.infer<typeof estimatorSchema>;

/** Each trial's fold (0…k−1), null where the trial is excluded; one row a repeat. */
const assignmentRowSchema = z.array(z.int().nonnegative().nullable());
export const foldsSchema = z.strictObject({
  kind: z.enum(['stratified', 'contiguous', 'leaveOneGroupOut', 'given']).default('stratified'),
  k: z.int().min(2).max(1000).optional(),
  purgeTrials: z.int().nonnegative().max(100_000).optional(),
  groupColumn: z.string().optional(),
  repeats: z.int().min(1).max(100).optional(),
  assignment: z.union([assignmentRowSchema, z.array(assignmentRowSchema)]).optional(),
  inner: z.union([z.array(assignmentRowSchema), z.array(z.array(assignmentRowSchema))]).optional(),
});
export type FoldsRecipe = z.infer<typeof foldsSchema>;

const nuisanceColumnSchema = z.strictObject({
  column: z.string(),
  term: z.enum(['linear', 'quadratic', 'spline', 'category']),
});
export type NuisanceColumn = z.infer<typeof nuisanceColumnSchema>;
export const nuisanceSchema = z.strictObject({
  columns: z.array(nuisanceColumnSchema).default([]),
  handling: z.enum(['none', 'adjust']).default('none'),
});

const permutationsSchema = z.union([
  z.array(z.array(indexSchema).min(1)).min(1),
  z.strictObject({ fileId: idSchema, path: z.string() }),
]);
export const nullSchema = z.strictObject({
  kind: z.enum(['none', 'free', 'within', 'groups', 'circularShift', 'sessions', 'given']).default('free'),
  column: z.string().optional(),
  draws: z.int().min(1).max(100_000).optional(),
  permutations: permutationsSchema.optional(),
  /** In a stored recipe whose permutations or label sequences are too long to repeat: their SHA-256. Never sent by a member. */
  inputsSha256: sha256Schema.optional(),
});
export type NullRecipe = z.infer<typeof nullSchema>;

const columnsSchema = z.array(nuisanceColumnSchema).min(1);
const levelsSchema = z.array(z.union([z.number(), z.string()])).min(1);
export const controlSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('nuisanceOnly'), columns: columnsSchema }),
  z.strictObject({ kind: z.literal('incremental'), columns: columnsSchema }),
  z.strictObject({ kind: z.literal('adjusted'), columns: columnsSchema }),
  z.strictObject({ kind: z.literal('totalRate') }),
  z.strictObject({ kind: z.literal('rateNormalised') }),
  z.strictObject({ kind: z.literal('trialOrder') }),
  z.strictObject({ kind: z.literal('window'), startMs: z.number(), endMs: z.number() }),
  z.strictObject({
    kind: z.literal('matched'),
    column: z.string(),
    draws: z.int().min(20).max(1000).default(20),
  }),
  z.strictObject({ kind: z.literal('breakCorrelations'), scope: z.enum(['train', 'all']) }),
  z.strictObject({
    kind: z.literal('generalise'),
    column: z.string(),
    train: levelsSchema,
    test: levelsSchema,
  }),
  z.strictObject({
    kind: z.literal('injection'),
    sizes: z.array(z.number().positive().lt(1)).min(1).max(20),
    draws: z.int().min(1).max(1000),
  }),
]);
export type ControlRecipe = z.infer<typeof controlSchema>;

export const viewSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('timeCourse'),
    widthMs: z.number().positive(),
    stepMs: z.number().positive(),
  }),
  z.strictObject({
    kind: z.literal('temporalGeneralisation'),
    widthMs: z.number().positive(),
    stepMs: z.number().positive(),
  }),
  z.strictObject({
    kind: z.literal('populationSize'),
    sizes: z.array(z.int().positive()).min(1).max(50),
    draws: z.int().min(1).max(1000),
  }),
  z.strictObject({
    kind: z.literal('learning'),
    sizes: z.array(z.int().positive()).min(1).max(50),
    draws: z.int().min(1).max(1000),
  }),
  z.strictObject({ kind: z.literal('singleUnits') }),
  z.strictObject({ kind: z.literal('weights') }),
]);
export type ViewRecipe = z.infer<typeof viewSchema>;

export const labelTransformSchema = z.strictObject({
  kind: z.enum(['none', 'log', 'logit']),
  epsilon: z.number().positive().lt(0.5).optional(),
});

/** What a member sends: everything but the label may be left out. */
export const recipeInputSchema = z.strictObject({
  label: z.string().min(1),
  labelTransform: labelTransformSchema.optional(),
  trials: trialsChoiceSchema.optional(),
  units: unitsChoiceSchema.optional(),
  exclusions: z.union([z.strictObject({ version: z.int().nonnegative() }), z.literal('none')]).optional(),
  window: z.strictObject({ startMs: z.number(), endMs: z.number() }).optional(),
  features: z.enum(['windowMean', 'bins']).optional(),
  transform: z.enum(['none', 'sqrt']).optional(),
  estimator: estimatorSchema.optional(),
  folds: foldsSchema.optional(),
  nuisance: nuisanceSchema.optional(),
  null: nullSchema.optional(),
  controls: z.array(controlSchema).max(30).optional(),
  views: z.array(viewSchema).max(20).optional(),
  seed: z.int().nonnegative().max(4_294_967_295).optional(),
});
export type RecipeInput = z.infer<typeof recipeInputSchema>;

/** A recipe with every default filled in: what is hashed, stored and carried out. */
export const recipeSchema = z.strictObject({
  label: z.string(),
  labelTransform: labelTransformSchema,
  trials: trialsChoiceSchema,
  units: unitsChoiceSchema,
  exclusions: z.union([z.strictObject({ version: z.int().nonnegative() }), z.literal('none')]),
  window: z.strictObject({ startMs: z.number(), endMs: z.number() }),
  features: z.enum(['windowMean', 'bins']),
  transform: z.enum(['none', 'sqrt']),
  estimator: estimatorSchema,
  folds: foldsSchema,
  nuisance: nuisanceSchema,
  null: nullSchema,
  controls: z.array(controlSchema),
  views: z.array(viewSchema),
  seed: z.int().nonnegative(),
});
export type Recipe = z.infer<typeof recipeSchema>;
