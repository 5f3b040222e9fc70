import { z } from 'zod';

export const idSchema = z.uuid();
export const instantSchema = z.iso.datetime({ offset: true });
export const sha256Schema = z.string().regex(/^[0-9a-f]{64}$/, 'a SHA-256 as 64 hexadecimal digits');
/** A name that a member types: no control characters, trimmed, never empty. */
export const nameSchema = z
  .string()
  .trim()
  .min(1, 'must not be empty')
  .max(200)
  // eslint-disable-next-line no-control-regex -- names go into headers and file names, so control characters are refused
  .regex(/^[^\u0000-\u001f\u007f]*$/, 'must not hold control characters');
export const textSchema = z.string().trim().max(20_000);
export const versionSchema = z.int().nonnegative();

/** Keyset page of a list. */
export function pageOf<T extends z.ZodType>(item: T) {
  return z.strictObject({ items: z.array(item), nextCursor: z.string().nullable() });
}
export const pageQuerySchema = z.strictObject({
  cursor: z.string().max(500).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
});
