import { redis } from '@/lib/jobs/connection';
import { within } from '@/lib/jobs/within';

const key = 'outfold:workers';
/** A worker that has not been heard of for this long counts as gone. */
const aliveForMs = 15_000;

/** Says that this worker is alive. Call every few seconds. Never throws. */
export async function announceWorker(workerId: string): Promise<void> {
  try {
    const now = Date.now();
    await redis()
      .multi()
      .zadd(key, now, workerId)
      .zremrangebyscore(key, 0, now - 4 * aliveForMs)
      .exec();
  } catch {
    // Redis is away; its connection has logged that.
  }
}

/** Takes a worker that stops off the list. Never throws. */
export async function withdrawWorker(workerId: string): Promise<void> {
  await within(redis().zrem(key, workerId), 500, 'Redis').catch(() => undefined);
}

/**
 * How many workers are alive, for the health page.
 * @throws when Redis is away
 */
export async function countWorkers(): Promise<number> {
  return within(redis().zcount(key, Date.now() - aliveForMs, '+inf'), 2_000, 'Redis');
}
