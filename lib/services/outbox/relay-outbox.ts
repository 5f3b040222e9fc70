import { lockDueOutbox, markOutboxSent, postponeOutbox } from '@/db/repositories/outbox';
import { inTransaction } from '@/db/transaction';
import { jobKinds, jobPayloadSchema, type JobKind } from '@/lib/jobs/definitions';
import { enqueue } from '@/lib/jobs/enqueue';
import { log } from '@/lib/log/log';

/**
 * Turns outbox entries that are due into jobs. Entries that could not be sent stay and come round again; an entry that
 * was sent but not yet marked is sent twice, which is one job. Several relays may run at once.
 * @returns how many entries were sent
 */
export async function relayOutbox(limit = 50): Promise<number> {
  return inTransaction(async (trx) => {
    const due = await lockDueOutbox(trx, limit);
    const sent: number[] = [];
    const kept: number[] = [];
    for (const entry of due) {
      const payload = jobPayloadSchema.safeParse(entry.payload);
      if (!isJobKind(entry.kind) || !payload.success) {
        log.error({ outboxId: entry.id, kind: entry.kind }, 'an outbox entry makes no sense and is dropped');
        sent.push(entry.id);
        continue;
      }
      // After one failure Redis is away: the rest need not wait for it each in turn.
      if (kept.length > 0) kept.push(entry.id);
      else
        await enqueue(entry.kind, payload.data).then(
          () => sent.push(entry.id),
          () => kept.push(entry.id),
        );
    }
    await markOutboxSent(trx, sent);
    await postponeOutbox(trx, kept);
    return sent.length;
  });
}

function isJobKind(kind: string): kind is JobKind {
  return (jobKinds as readonly string[]).includes(kind);
}
