import os from 'node:os';
import { z } from 'zod';

const ms = (fallback: number) => z.coerce.number().int().min(50).max(3_600_000).default(fallback);

const settingsSchema = z.object({
  /** Readouts at once; each has a process with its own threads. */
  WORKER_READOUTS: z.coerce.number().int().min(1).max(64).default(2),
  /** Files read, and intakes carried out, at once. */
  WORKER_READERS: z.coerce.number().int().min(1).max(64).default(2),
  /** Threads of a readout. */
  WORKER_THREADS: z.coerce
    .number()
    .int()
    .min(1)
    .max(64)
    .default(Math.max(1, Math.min(2, os.availableParallelism()))),
  /** How far computing gives way to the web server on the same machine, as nice(1) counts: 0 not at all, 19 wholly. */
  WORKER_NICE: z.coerce.number().int().min(0).max(19).default(5),
  /** The most that one readout may hold in memory. */
  WORKER_MEMORY_BYTES: z.coerce.number().int().min(1).optional(),
  /** A claim without a heartbeat for this long is lost. */
  WORKER_STALE_MS: ms(20_000),
  /** A row that waits for this long without a job gets one. */
  WORKER_WAITING_MS: ms(10_000),
  /** How often lost work is looked for. */
  WORKER_RECONCILE_MS: ms(5_000),
  /** How often a claim is renewed and a wish to cancel is looked for. */
  WORKER_HEARTBEAT_MS: ms(400),
  WORKER_RELAY_MS: ms(500),
  /** How long running work may go on after a signal to stop; what is not finished goes back to the queue. */
  WORKER_DRAIN_MS: z.coerce.number().int().min(0).max(3_600_000).default(4_000),
  /** Finished pieces are kept for a later attempt when a readout is expected to take longer than this. */
  WORKER_KEEP_PARTS_SECONDS: z.coerce.number().min(0).default(4),
  /** A readout that is expected to take longer than this is spread over all workers. */
  WORKER_SPLIT_SECONDS: z.coerce.number().min(0).default(30),
});

/** The worker's own settings, checked, with defaults from the machine. */
export function workerSettings(source: NodeJS.ProcessEnv = process.env) {
  const given = Object.fromEntries(Object.entries(source).filter(([, value]) => value !== ''));
  const settings = settingsSchema.parse(given);
  return {
    ...settings,
    WORKER_MEMORY_BYTES:
      settings.WORKER_MEMORY_BYTES ?? Math.floor((0.75 * os.totalmem()) / settings.WORKER_READOUTS),
  };
}
export type WorkerSettings = ReturnType<typeof workerSettings>;
