import { AppError } from '@/lib/errors/app-error';
import { jobDefinitions, jobIdOf, type JobKind, type JobPayload } from '@/lib/jobs/definitions';
import { queueOf } from '@/lib/jobs/queues';
import { within } from '@/lib/jobs/within';

/**
 * Puts one job into Redis. The same kind, id and attempt twice is one job.
 * @throws AppError 'unavailable' within about three seconds when Redis is away
 */
export async function enqueue(kind: JobKind, payload: JobPayload): Promise<void> {
  const valid = jobDefinitions[kind].payload.parse(payload);
  try {
    await within(queueOf(kind).add(kind, valid, { jobId: jobIdOf(kind, valid) }), 3_000, 'Redis');
  } catch (error) {
    throw new AppError('unavailable', 'The job queue is away.', { cause: error });
  }
}
