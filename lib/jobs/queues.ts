import { Queue } from 'bullmq';
import { jobDefinitions, jobKinds, queuePrefix, type JobKind } from '@/lib/jobs/definitions';
import { redis } from '@/lib/jobs/connection';
import { within } from '@/lib/jobs/within';

const shared = globalThis as typeof globalThis & { outfoldQueues?: Map<JobKind, Queue> };

/** The producer's side of one queue; all queues share the one fail-fast connection. */
export function queueOf(kind: JobKind): Queue {
  const queues = (shared.outfoldQueues ??= new Map());
  let queue = queues.get(kind);
  if (!queue) {
    queue = new Queue(jobDefinitions[kind].queue, {
      connection: redis(),
      prefix: queuePrefix,
      skipVersionCheck: true,
      defaultJobOptions: { removeOnComplete: true, removeOnFail: true, attempts: 1 },
    });
    queue.on('error', () => undefined); // the connection reports outages itself
    queues.set(kind, queue);
  }
  return queue;
}

/** Closes all queues, at most `limitMs`. */
export async function closeQueues(limitMs = 2_000): Promise<void> {
  const queues = shared.outfoldQueues;
  if (!queues) return;
  delete shared.outfoldQueues;
  const closing = jobKinds.flatMap((kind) => queues.get(kind)?.close() ?? []);
  await within(Promise.all(closing), limitMs, 'Redis').catch(() => undefined);
}
