import { z } from 'zod';
import { idSchema } from '@/lib/contracts/common';

/** Work that the worker does. The row that `id` names holds the truth; the job only says "look at it". */
export const jobKinds = ['run-readout', 'read-file', 'run-intake'] as const;
export type JobKind = (typeof jobKinds)[number];

/**
 * `attempt` is how often the row had been claimed when this job was made. It makes a later delivery a different job,
 * so that a job of a killed worker, whose lock still lies in Redis, does not stand in the way of the next one.
 */
export const jobPayloadSchema = z.strictObject({
  id: idSchema,
  attempt: z.int().nonnegative().default(0),
});
export type JobPayload = z.infer<typeof jobPayloadSchema>;

/** A queue and what its jobs carry. */
export interface QueueDefinition<P> {
  queue: string;
  payload: z.ZodType<P>;
}

export const jobDefinitions: Record<JobKind, QueueDefinition<JobPayload>> = {
  'run-readout': { queue: 'run-readout', payload: jobPayloadSchema },
  'read-file': { queue: 'read-file', payload: jobPayloadSchema },
  'run-intake': { queue: 'run-intake', payload: jobPayloadSchema },
};

/** Prefix of every key that the queues keep in Redis. */
export const queuePrefix = 'outfold';

/** BullMQ refuses ids with ':' and ids of digits only; this form has neither. */
export function jobIdOf(kind: JobKind, payload: JobPayload): string {
  return `${kind}-${payload.id}-${payload.attempt}`;
}
