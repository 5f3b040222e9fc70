import { setTimeout as sleep } from 'node:timers/promises';
import { addToOutbox } from '@/db/repositories/outbox';
import { endReadout, lockClaim, releaseReadout, type ReadoutEnd } from '@/db/repositories/readout-claims';
import { removeReadoutParts } from '@/db/repositories/readout-parts';
import type { ReadoutRow } from '@/db/repositories/readouts';
import { inTransaction, type Transaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { AppError } from '@/lib/errors/app-error';
import { publishLive } from '@/lib/jobs/publish-live';
import { log } from '@/lib/log/log';

/** How long a finished readout waits for a database that is away. */
const patienceMs = 120_000;

/**
 * Writes how a claimed readout ended, once: nothing is written when the claim was lost meanwhile. Result, state and
 * audit row stand or fall together.
 */
export async function finishReadoutRow(row: ReadoutRow, claim: string, end: ReadoutEnd): Promise<void> {
  const written = await untilDatabaseIsBack(async (trx) => {
    if (!(await lockClaim(trx, row.id, claim))) return false;
    await endReadout(trx, row.id, end);
    await removeReadoutParts(trx, row.id);
    await writeAudit(trx, author(row), {
      action: `readout.${end.state}`,
      subjectKind: 'readout',
      subjectId: row.id,
      detail: {
        number: row.number,
        attempts: row.attempts,
        ...(end.state === 'failed' ? { problems: end.problems.map(({ code }) => code) } : {}),
      },
    });
    return true;
  });
  if (!written) {
    log.warn({ readoutId: row.id }, 'a readout ended after its claim was lost; nothing was written');
    return;
  }
  const { labId, sessionId, id: readoutId } = row;
  await publishLive({ labId, kind: 'readout', sessionId, readoutId, state: end.state, progress: null });
}

/** Gives a claimed readout back to the queue; another worker, or this one when it is back, goes on with it. */
export async function returnReadoutRow(row: ReadoutRow, claim: string): Promise<void> {
  await untilDatabaseIsBack(async (trx) => {
    if (!(await releaseReadout(trx, row.id, claim))) return;
    await addToOutbox(trx, { kind: 'run-readout', payload: { id: row.id, attempt: row.attempts } });
  });
  const { labId, sessionId, id: readoutId } = row;
  await publishLive({ labId, kind: 'readout', sessionId, readoutId, state: 'queued', progress: null });
}

function author({ labId, authorId, id }: ReadoutRow) {
  return { actor: { labId, userId: authorId }, requestId: `readout-${id}` };
}

async function untilDatabaseIsBack<T>(work: (trx: Transaction) => Promise<T>): Promise<T> {
  const giveUpAt = Date.now() + patienceMs;
  for (;;) {
    try {
      return await inTransaction(work);
    } catch (error) {
      if (!(error instanceof AppError) || error.code !== 'unavailable' || Date.now() > giveUpAt) throw error;
      await sleep(500);
    }
  }
}
