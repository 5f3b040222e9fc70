import { Queue } from 'bullmq';
import { redis } from '@/lib/jobs/connection';
import { queuePrefix } from '@/lib/jobs/definitions';
import { finishJobId, finishQueue } from '@/lib/jobs/readout-flow';
import { within } from '@/lib/jobs/within';

/** Whether Redis still holds the flow of a readout's attempt: some of its jobs wait or run. */
export async function isFlowLive(id: string, attempt: number): Promise<boolean> {
  const queue = new Queue(finishQueue.queue, {
    connection: redis(),
    prefix: queuePrefix,
    skipVersionCheck: true,
  });
  queue.on('error', () => undefined); // the connection reports outages itself
  const state = await within(queue.getJobState(finishJobId({ id, attempt })), 3_000, 'Redis');
  return state !== 'unknown' && state !== 'completed' && state !== 'failed';
}
