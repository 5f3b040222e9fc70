import { z } from 'zod';
import { idSchema, instantSchema, nameSchema, sha256Schema, textSchema, versionSchema } from './common';
import { problemSchema } from './problem';

export const createSessionSchema = z.strictObject({
  studyId: idSchema,
  animalId: idSchema,
  startedAt: instantSchema,
  name: nameSchema,
});
export type CreateSession = z.infer<typeof createSessionSchema>;

/** Only what is named changes. */
export const changeSessionSchema = z
  .strictObject({ startedAt: instantSchema, name: nameSchema })
  .partial()
  .refine((value) => Object.keys(value).length > 0, { message: 'name at least one field to change' });
export type ChangeSession = z.infer<typeof changeSessionSchema>;

export const sessionStateSchema = z.enum(['empty', 'checking', 'waiting', 'ready', 'refused']);
export type SessionState = z.infer<typeof sessionStateSchema>;

export const columnTypeSchema = z.enum(['number', 'category', 'circular']);
export const labelKindSchema = z.enum(['nominal', 'realised', 'other']);

/** A trial or unit column of the current data version. */
export const columnFactSchema = z.strictObject({
  name: z.string(),
  type: columnTypeSchema,
  periodDeg: z.number().optional(),
  missing: z.int(),
  distinct: z.int(),
  min: z.number().nullable(),
  max: z.number().nullable(),
});
export type ColumnFact = z.infer<typeof columnFactSchema>;
export const labelFactSchema = z.strictObject({ column: z.string(), kind: labelKindSchema });
export type LabelFact = z.infer<typeof labelFactSchema>;

export const sessionSchema = z.strictObject({
  id: idSchema,
  studyId: idSchema,
  animalId: idSchema,
  animalCode: z.string(),
  name: z.string(),
  startedAt: instantSchema,
  createdAt: instantSchema,
  version: versionSchema,
  state: sessionStateSchema,
  dataVersion: z.int().nullable(),
  dataHash: sha256Schema.nullable(),
  countsHash: sha256Schema.nullable(),
  trials: z.int().nullable(),
  units: z.int().nullable(),
  bins: z.int().nullable(),
  binWidthMs: z.number().nullable(),
  windowStartMs: z.number().nullable(),
  trialColumns: z.array(columnFactSchema),
  unitColumns: z.array(columnFactSchema),
  labels: z.array(labelFactSchema),
  problems: z.array(problemSchema),
});
export type Session = z.infer<typeof sessionSchema>;

/** Leaves trials or units out (`leave out`), or takes an earlier exclusion back (`put back`). Indices count from 0. */
export const createExclusionSchema = z
  .strictObject({
    action: z.enum(['leaveOut', 'putBack']).default('leaveOut'),
    trials: z.array(z.int().nonnegative()).min(1).max(1_000_000).optional(),
    units: z.array(z.int().nonnegative()).min(1).max(1_000_000).optional(),
    reason: textSchema.min(1, 'a reason is needed'),
  })
  .refine((value) => (value.trials === undefined) !== (value.units === undefined), {
    message: 'name either trials or units',
  });
export type CreateExclusion = z.infer<typeof createExclusionSchema>;
export const exclusionSchema = z.strictObject({
  version: z.int().positive(),
  action: z.enum(['leaveOut', 'putBack']),
  kind: z.enum(['trial', 'unit']),
  indices: z.array(z.int().nonnegative()),
  reason: z.string(),
  authorId: idSchema,
  authorName: z.string(),
  createdAt: instantSchema,
});
export type Exclusion = z.infer<typeof exclusionSchema>;
/** `version` counts the entries so far; a readout names the version that it used. */
export const exclusionListSchema = z.strictObject({
  version: z.int().nonnegative(),
  items: z.array(exclusionSchema),
  excludedTrials: z.array(z.int()),
  excludedUnits: z.array(z.int()),
});
export type ExclusionList = z.infer<typeof exclusionListSchema>;
