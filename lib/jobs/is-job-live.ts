import { jobIdOf, type JobKind, type JobPayload } from '@/lib/jobs/definitions';
import { queueOf } from '@/lib/jobs/queues';
import { within } from '@/lib/jobs/within';

/** Whether Redis still holds a job that will be, or is being, worked on. */
export async function isJobLive(kind: JobKind, payload: JobPayload): Promise<boolean> {
  const state = await within(queueOf(kind).getJobState(jobIdOf(kind, payload)), 3_000, 'Redis');
  return state !== 'unknown' && state !== 'completed' && state !== 'failed';
}
