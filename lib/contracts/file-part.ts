import { z } from 'zod';
import { idSchema, sha256Schema } from './common';

/** The parameters of …/files/{id}/parts/{n}. */
export const filePartParamsSchema = z.strictObject({
  id: idSchema,
  n: z
    .string()
    .regex(/^\d{1,5}$/)
    .transform(Number),
});

/** A part that has arrived whole. */
export const filePartSchema = z.strictObject({ number: z.int().positive(), sha256: sha256Schema });
export type FilePart = z.infer<typeof filePartSchema>;
