import { db } from '@/db/connection';
import { leaseOutbox, markOutboxSent, postponeOutbox } from '@/db/repositories/outbox';
import { jobKinds, jobPayloadSchema, type JobKind } from '@/lib/jobs/definitions';
import { enqueue } from '@/lib/jobs/enqueue';
import { log } from '@/lib/log/log';

/**
 * Turns outbox entries that are due into jobs. Entries that could not be sent stay and come round again; an entry that
 * was sent but not yet marked is sent twice, which is one job. Several relays may run at once.
 * @returns how many entries were sent
 */
export async function relayOutbox(limit = 50): Promise<number> {
  const sent: number[] = [];
  const kept: number[] = [];
  for (const entry of await leaseOutbox(db(), limit, 20)) {
    const payload = jobPayloadSchema.safeParse(entry.payload);
    if (!isJobKind(entry.kind) || !payload.success) {
      log.error({ outboxId: entry.id, kind: entry.kind }, 'an outbox entry makes no sense and is dropped');
      sent.push(entry.id);
    } else if (kept.length > 0) {
      // After one failure Redis is away: the rest need not wait for it each in turn.
      kept.push(entry.id);
    } else
      await enqueue(entry.kind, payload.data).then(
        () => sent.push(entry.id),
        () => kept.push(entry.id),
      );
  }
  await markOutboxSent(db(), sent);
  await postponeOutbox(db(), kept);
  return sent.length;
}

function isJobKind(kind: string): kind is JobKind {
  return (jobKinds as readonly string[]).includes(kind);
}
