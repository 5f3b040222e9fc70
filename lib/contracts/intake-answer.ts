import { z } from 'zod';
import { idSchema } from './common';
import { intakeSchema } from './intake';
import { problemSchema } from './problem';
import { columnTypeSchema, sessionStateSchema } from './session';

/** What submitting an intake answers: the session is being checked. */
export const intakeStateSchema = z.strictObject({ intakeId: idSchema, state: sessionStateSchema });
export type IntakeStarted = z.infer<typeof intakeStateSchema>;

/** A mapping to try out without writing anything; `nTrials` first trials are shown. */
export const previewInputSchema = z.strictObject({
  intake: intakeSchema,
  nTrials: z.int().min(1).max(50).default(8),
});
export type PreviewInput = z.infer<typeof previewInputSchema>;

/** The first trials as a mapping reads them, and everything that its checks found; zeros and no columns where it cannot be read. */
export const intakePreviewSchema = z.strictObject({
  nTrials: z.int(),
  nUnits: z.int(),
  nBins: z.int(),
  columns: z.array(
    z.strictObject({
      name: z.string(),
      type: columnTypeSchema,
      values: z.array(z.union([z.number(), z.string(), z.null()])),
    }),
  ),
  /** Spikes of each of the first trials, all units and bins. */
  totals: z.array(z.number()),
  /** Counts of the first trial, a row a unit: at most 24 units and 400 bins, for a picture to recognise the recording by. */
  firstTrial: z.array(z.array(z.int().nonnegative())).optional(),
  problems: z.array(problemSchema),
});
export type IntakePreview = z.infer<typeof intakePreviewSchema>;
