import { z } from 'zod';

/**
 * What is kept about one object of the canonical form. For a counts part, `counts` says where each bin's block of
 * trials × units lies in the object's bytes (bin k starts at `dataOffset + k·binStrideBytes`), so that one window is
 * read by one range request a part.
 */
export const partRecordSchema = z.strictObject({
  name: z.string(),
  sizeBytes: z.int().nonnegative(),
  sha256: z.string(),
  counts: z
    .strictObject({
      trialFrom: z.int().nonnegative(),
      nTrials: z.int().nonnegative(),
      nUnits: z.int().positive(),
      nBins: z.int().positive(),
      bytesPerCount: z.union([z.literal(1), z.literal(2), z.literal(4)]),
      dataOffset: z.int().nonnegative(),
      binStrideBytes: z.int().nonnegative(),
    })
    .optional(),
});
export type PartRecord = z.infer<typeof partRecordSchema>;
