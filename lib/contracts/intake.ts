import { z } from 'zod';
import { idSchema } from './common';
import { columnTypeSchema, labelKindSchema } from './session';

const axisSchema = z.enum(['trial', 'unit', 'bin']);
export type CountsAxis = z.infer<typeof axisSchema>;

/** Where the spike counts come from. Table columns that number trials, units or bins may count from 0 or 1 (`base`). */
export const countsSourceSchema = z.union([
  z.strictObject({ fileId: idSchema, path: z.string(), axes: z.array(axisSchema).min(2).max(3) }),
  z.strictObject({
    fileId: idSchema,
    wide: z.strictObject({
      trial: z.string().optional(),
      pattern: z.string(),
      base: z.union([z.literal(0), z.literal(1)]).optional(),
    }),
  }),
  z.strictObject({
    fileId: idSchema,
    long: z.strictObject({
      trial: z.string(),
      unit: z.string(),
      bin: z.string(),
      count: z.string(),
      shape: z.tuple([z.int().positive(), z.int().positive(), z.int().positive()]).optional(),
      base: z.union([z.literal(0), z.literal(1)]).optional(),
    }),
  }),
  z.strictObject({
    fileId: idSchema,
    spikeTimes: z.strictObject({
      align: z.string(),
      startMs: z.number(),
      endMs: z.number(),
      latencyMs: z.number().optional(),
    }),
  }),
]);
export type CountsSource = z.infer<typeof countsSourceSchema>;

export const columnSourceSchema = z.union([
  z.string(),
  z.strictObject({ path: z.string(), type: columnTypeSchema, periodDeg: z.number().positive().optional() }),
]);
export const tableSourceSchema = z.strictObject({
  fileId: idSchema,
  columns: z.record(z.string().min(1).max(120), columnSourceSchema).optional(),
});
export type TableSource = z.infer<typeof tableSourceSchema>;

export const labelSourceSchema = z.union([
  z.strictObject({ column: z.string(), kind: labelKindSchema }),
  z.strictObject({
    name: z.string(),
    fromStimulus: z.strictObject({
      centring: z.enum(['location', 'axis', 'none']),
      clip: z.boolean().default(false),
    }),
  }),
  z.strictObject({
    name: z.string(),
    fromStrengths: z.strictObject({ shared: z.string(), own: z.string() }),
  }),
]);
export type LabelSource = z.infer<typeof labelSourceSchema>;

/** How a session's files are to be read: which array is what. */
export const intakeSchema = z.strictObject({
  counts: countsSourceSchema,
  binWidthMs: z.number().positive(),
  windowStartMs: z.number(),
  trials: tableSourceSchema,
  labels: z.array(labelSourceSchema).min(1),
  units: tableSourceSchema.optional(),
  stimulus: z
    .strictObject({
      velocity: z.strictObject({
        fileId: idSchema,
        path: z.string(),
        axes: z.array(z.enum(['trial', 'location', 'axis', 'frame'])).length(4),
      }),
      frameMs: z.number().positive(),
    })
    .optional(),
  acceptWarnings: z.boolean().default(false),
});
export type Intake = z.infer<typeof intakeSchema>;

/** A proposed mapping: `intake` may lack parts that could not be told; `questions` says what to ask. */
export const intakeProposalSchema = z.strictObject({
  intake: intakeSchema.partial(),
  questions: z.array(
    z.strictObject({ field: z.string(), question: z.string(), options: z.array(z.string()) }),
  ),
});
export type IntakeProposal = z.infer<typeof intakeProposalSchema>;
