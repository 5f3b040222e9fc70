import { Worker } from 'bullmq';
import { log } from '@/lib/log/log';
import { workerConnection } from '@/lib/jobs/connection';
import { queuePrefix, type JobPayload, type QueueDefinition } from '@/lib/jobs/definitions';
import { within } from '@/lib/jobs/within';

/** What a handler may know of the job that called it. */
export interface JobContext {
  jobId: string;
  /** Aborts when the worker must stop: the handler gives its row back and returns soon. */
  stopping: AbortSignal;
}
export type JobHandler<P = JobPayload> = (payload: P, context: JobContext) => Promise<void>;

export interface Consumer {
  /** Takes no more jobs and waits for those that run, at most `limitMs`. */
  close(limitMs: number): Promise<void>;
}

/** Starts taking jobs of one kind. At least once: a handler may see the same job twice and must not mind. */
export function consume<P extends { id: string }>(
  { queue, payload: schema }: QueueDefinition<P>,
  handler: JobHandler<P>,
  options: { concurrency: number; stopping: AbortSignal },
): Consumer {
  const connection = workerConnection();
  const worker = new Worker(
    queue,
    async (job) => {
      const payload = schema.parse(job.data);
      try {
        await handler(payload, { jobId: job.id ?? '', stopping: options.stopping });
      } catch (error) {
        log.error({ err: error, queue, id: payload.id }, 'a job failed');
        throw error;
      }
    },
    {
      connection,
      prefix: queuePrefix,
      concurrency: options.concurrency,
      lockDuration: 30_000,
      stalledInterval: 5_000,
      maxStalledCount: 3,
      removeOnComplete: { count: 0 },
      removeOnFail: { count: 0 },
      skipVersionCheck: true,
    },
  );
  // Outages and locks lost with Redis's data come here; the row's claim in MariaDB is what counts.
  worker.on('error', (error) => log.debug({ queue, cause: error.message }, 'queue error'));
  return {
    close: async (limitMs) => {
      await within(worker.close(), limitMs, 'Redis').catch(() => undefined);
      connection.disconnect();
    },
  };
}
