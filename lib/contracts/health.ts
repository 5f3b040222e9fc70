import { z } from 'zod';

const partStateSchema = z.enum(['ready', 'away']);
export const healthSchema = z.strictObject({
  state: z.enum(['ready', 'notReady']),
  parts: z.strictObject({
    database: partStateSchema,
    queue: partStateSchema,
    store: partStateSchema,
    mail: partStateSchema,
    worker: partStateSchema,
  }),
});
export type Health = z.infer<typeof healthSchema>;
