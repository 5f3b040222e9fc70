import { z } from 'zod';
import { idSchema, instantSchema, sha256Schema } from './common';

export const auditEntrySchema = z.strictObject({
  id: z.int().positive(),
  action: z.string(),
  subjectKind: z.string(),
  subjectId: z.string(),
  detail: z.record(z.string(), z.unknown()),
  actorId: idSchema.nullable(),
  actorName: z.string().nullable(),
  requestId: z.string().nullable(),
  createdAt: instantSchema,
  hash: sha256Schema,
});
export type AuditEntry = z.infer<typeof auditEntrySchema>;

/** Whether the lab's audit chain holds, from its first row to its head. */
export const auditVerificationSchema = z.strictObject({
  holds: z.boolean(),
  entries: z.int().nonnegative(),
  headHash: sha256Schema.nullable(),
  faults: z.array(z.strictObject({ entryId: z.int().nullable(), message: z.string() })),
});
export type AuditVerification = z.infer<typeof auditVerificationSchema>;
