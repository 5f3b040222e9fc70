import { z } from 'zod';
import { columnTypeSchema } from './session';

/** A trial or unit table of one data version, with columns that follow from the counts (`derived`). Null is missing. */
export const dataTableSchema = z.strictObject({
  dataVersion: z.int().positive(),
  dataHash: z.string(),
  nRows: z.int().nonnegative(),
  columns: z.array(
    z.strictObject({
      name: z.string(),
      type: columnTypeSchema,
      periodDeg: z.number().optional(),
      isDerived: z.boolean(),
      values: z.array(z.union([z.number(), z.string(), z.null()])),
    }),
  ),
});
export type DataTable = z.infer<typeof dataTableSchema>;
/** Which data version is wanted; the newest if none is named. */
export const dataQuerySchema = z.strictObject({ version: z.coerce.number().int().positive().optional() });
