import { z } from 'zod';

/** How much a problem matters: it stops the step, warns (must be accepted), or is only noted. */
export const severitySchema = z.enum(['stops', 'warns', 'notes']);
export type Severity = z.infer<typeof severitySchema>;

/** Where in a member's data a problem lies. Rows, units and bins count from 0; lines and columns of text files from 1. */
export const placeSchema = z.strictObject({
  file: z.string().optional(),
  path: z.string().optional(),
  trial: z.int().optional(),
  unit: z.int().optional(),
  bin: z.int().optional(),
  line: z.int().optional(),
  column: z.union([z.int(), z.string()]).optional(),
  fold: z.int().optional(),
});
export type Place = z.infer<typeof placeSchema>;

/** One fault or remark about data or a recipe, in words a member can act on. */
export const problemSchema = z.strictObject({
  code: z.string(),
  severity: severitySchema,
  message: z.string(),
  remedy: z.string().optional(),
  place: placeSchema,
});
export type Problem = z.infer<typeof problemSchema>;
