import { z } from 'zod';
import { idSchema } from './common';
import { roleSchema, scopeSchema } from './lab';

/** Who the caller is, in which lab, with which rights. `scopes` is null for a member who signed in. */
export const meSchema = z.strictObject({
  userId: idSchema,
  name: z.string(),
  email: z.string(),
  labId: idSchema,
  labName: z.string(),
  role: roleSchema,
  scopes: z.array(scopeSchema).nullable(),
  actions: z.array(z.string()),
});
export type Me = z.infer<typeof meSchema>;
