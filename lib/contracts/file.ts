import { z } from 'zod';
import { idSchema, instantSchema, sha256Schema } from './common';
import { problemSchema } from './problem';

export const createFileSchema = z.strictObject({
  name: z.string().min(1).max(255),
  sizeBytes: z
    .int()
    .nonnegative()
    .max(50 * 1024 ** 3),
  sha256: sha256Schema.optional(),
});
export type CreateFile = z.infer<typeof createFileSchema>;

export const fileStateSchema = z.enum(['uploading', 'reading', 'readable', 'refused']);
export const fileFormatSchema = z.enum([
  'npy',
  'npz',
  'csv',
  'mat5',
  'mat73',
  'hdf5',
  'nwb',
  'arrow',
  'parquet',
  'json',
]);
export type FileFormat = z.infer<typeof fileFormatSchema>;

/** One array or table column that a file holds. `dtype` is one word: uint8 … int64, float16 … float64, bool, string. */
export const arrayFactSchema = z.strictObject({
  path: z.string(),
  dtype: z.string(),
  shape: z.array(z.int().nonnegative()),
  /** The first few values as text, for a person to recognise the array by. */
  sample: z.array(z.string()).optional(),
});
export type ArrayFact = z.infer<typeof arrayFactSchema>;

export const fileSchema = z.strictObject({
  id: idSchema,
  sessionId: idSchema,
  name: z.string(),
  sizeBytes: z.int(),
  partSizeBytes: z.int(),
  sha256: sha256Schema.nullable(),
  state: fileStateSchema,
  format: fileFormatSchema.nullable(),
  /** Numbers of the parts that have arrived, while uploading. */
  parts: z.array(z.int()),
  arrays: z.array(arrayFactSchema),
  problems: z.array(problemSchema),
  createdAt: instantSchema,
});
export type StoredFile = z.infer<typeof fileSchema>;
