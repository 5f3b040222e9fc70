import { FlowProducer } from 'bullmq';
import { z } from 'zod';
import { idSchema } from '@/lib/contracts/common';
import { AppError } from '@/lib/errors/app-error';
import { redis } from '@/lib/jobs/connection';
import { queuePrefix, type QueueDefinition } from '@/lib/jobs/definitions';
import { within } from '@/lib/jobs/within';

/**
 * A large readout over many workers: `parts` pieces of its chunks that run anywhere in any order, then one job that puts
 * them together. `token` is the claim that the readout's row carries meanwhile; a job of an older flow does not know it.
 */
const flowPayloadSchema = z.strictObject({
  id: idSchema,
  attempt: z.int().nonnegative(),
  token: z.string(),
  parts: z.int().positive(),
});
export type FlowPayload = z.infer<typeof flowPayloadSchema>;
const partPayloadSchema = flowPayloadSchema.extend({ part: z.int().nonnegative() });
export type PartPayload = z.infer<typeof partPayloadSchema>;

export const partQueue: QueueDefinition<PartPayload> = {
  queue: 'run-readout-part',
  payload: partPayloadSchema,
};
export const finishQueue: QueueDefinition<FlowPayload> = {
  queue: 'finish-readout',
  payload: flowPayloadSchema,
};

/** The id of a flow's last job, which is in Redis as long as the flow is alive. */
export function finishJobId({ id, attempt }: Pick<FlowPayload, 'id' | 'attempt'>): string {
  return `finish-readout-${id}-${attempt}`;
}

/**
 * Puts a flow into Redis.
 * @throws AppError 'unavailable' when Redis is away
 */
export async function addReadoutFlow(payload: FlowPayload): Promise<void> {
  const producer = new FlowProducer({ connection: redis(), prefix: queuePrefix, skipVersionCheck: true });
  producer.on('error', () => undefined); // the connection reports outages itself
  const kept = { removeOnComplete: true, removeOnFail: true };
  try {
    await within(
      producer.add({
        name: finishQueue.queue,
        queueName: finishQueue.queue,
        data: payload,
        opts: { ...kept, jobId: finishJobId(payload) },
        children: Array.from({ length: payload.parts }, (_, part) => ({
          name: partQueue.queue,
          queueName: partQueue.queue,
          data: { ...payload, part },
          // What a lost part leaves undone, the last job does: it must not wait for ever.
          opts: {
            ...kept,
            jobId: `run-readout-part-${payload.id}-${payload.attempt}-${part}`,
            attempts: 5,
            ignoreDependencyOnFailure: true,
          },
        })),
      }),
      5_000,
      'Redis',
    );
  } catch (error) {
    throw new AppError('unavailable', 'The job queue is away.', { cause: error });
  }
}
