import { Worker } from 'bullmq';
import { log } from '@/lib/log/log';
import { workerConnection } from '@/lib/jobs/connection';
import { jobDefinitions, queuePrefix, type JobKind, type JobPayload } from '@/lib/jobs/definitions';
import { within } from '@/lib/jobs/within';

/** What a handler may know of the job that called it. */
export interface JobContext {
  jobId: string;
  /** Aborts when the worker must stop: the handler gives its row back and returns soon. */
  stopping: AbortSignal;
}
export type JobHandler = (payload: JobPayload, context: JobContext) => Promise<void>;

export interface Consumer {
  kind: JobKind;
  /** Takes no more jobs and waits for those that run, at most `limitMs`. */
  close(limitMs: number): Promise<void>;
}

/** Starts taking jobs of one kind. At least once: a handler may see the same job twice and must not mind. */
export function consume(
  kind: JobKind,
  handler: JobHandler,
  options: { concurrency: number; stopping: AbortSignal },
): Consumer {
  const connection = workerConnection();
  const worker = new Worker(
    jobDefinitions[kind].queue,
    async (job) => {
      const payload = jobDefinitions[kind].payload.parse(job.data);
      try {
        await handler(payload, { jobId: job.id ?? '', stopping: options.stopping });
      } catch (error) {
        log.error({ err: error, kind, id: payload.id }, 'a job failed');
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
  worker.on('error', (error) => log.debug({ kind, cause: error.message }, 'queue error'));
  return {
    kind,
    close: async (limitMs) => {
      await within(worker.close(), limitMs, 'Redis').catch(() => undefined);
      connection.disconnect();
    },
  };
}
