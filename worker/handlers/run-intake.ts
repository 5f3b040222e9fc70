import { randomBytes } from 'node:crypto';
import { v7 } from 'uuid';
import { db } from '@/db/connection';
import { insertDataVersion } from '@/db/repositories/data-versions';
import { findSessionFiles } from '@/db/repositories/files';
import {
  beatIntake,
  claimIntake,
  endIntake,
  findIntakeForWorker,
  lockIntakeClaim,
  releaseIntake,
  setSessionState,
  type IntakeRow,
} from '@/db/repositories/intakes';
import { addToOutbox } from '@/db/repositories/outbox';
import { lockSession } from '@/db/repositories/recording-sessions';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { Problem } from '@/lib/contracts/problem';
import type { IntakeOutcome } from '@/lib/intake/reader-messages';
import type { JobHandler } from '@/lib/jobs/consume';
import { publishLive } from '@/lib/jobs/publish-live';
import { log } from '@/lib/log/log';
import { lostProblem } from '@/lib/services/intake/lost-problem';
import { ReaderLost } from '@/lib/services/intake/reader-lost';
import { readerSeconds } from '@/lib/services/intake/reader-seconds';
import { runReader } from '@/lib/services/intake/run-reader';
import { keys } from '@/storage/keys';
import { objectStore } from '@/storage/object-store';
import { workerSettings } from '@/worker/settings';

const MAX_ATTEMPTS = 5;

/**
 * Carries an intake out: claims its row, has the files read and checked in a process of its own, and writes what came of
 * it. A second delivery finds no row to claim and changes nothing; objects lie under the hash of their content, so an
 * interrupted attempt leaves nothing that a later one minds.
 */
export const runIntake: JobHandler = async ({ id }, { stopping }) => {
  if (stopping.aborted) return;
  const claim = `intake-${randomBytes(8).toString('hex')}`;
  if (!(await claimIntake(db(), id, claim))) return;
  const row = await findIntakeForWorker(db(), id);
  if (row === null) return;
  const held = holdIntake(id, claim, stopping);
  try {
    const outcome =
      row.attempts > MAX_ATTEMPTS
        ? { problems: [interrupted(row.attempts - 1)], made: null }
        : await read(row, held.abort.signal);
    await finish(row, claim, outcome);
  } catch (error) {
    // Given back for another try: the store or the database was away, or this worker stops. A lost claim gives nothing back.
    await giveBack(row, claim).catch(() => undefined);
    if (!held.abort.signal.aborted) throw error;
  } finally {
    held.letGo();
  }
};

/** Renews the claim until it is let go; its signal aborts when the claim is lost or the worker stops. */
function holdIntake(
  id: string,
  claim: string,
  stopping: AbortSignal,
): { abort: AbortController; letGo(): void } {
  const abort = new AbortController();
  const timer = setInterval(() => {
    beatIntake(db(), id, claim).then(
      (isHeld) => {
        if (!isHeld) abort.abort(new Error('the claim was lost'));
      },
      (error: unknown) => log.debug({ err: error, intakeId: id }, 'a heartbeat failed'),
    );
  }, workerSettings().WORKER_HEARTBEAT_MS);
  const onStopping = (): void => abort.abort(new Error('the worker stops'));
  stopping.addEventListener('abort', onStopping, { once: true });
  return {
    abort,
    letGo: () => {
      clearInterval(timer);
      stopping.removeEventListener('abort', onStopping);
    },
  };
}

async function read(row: IntakeRow, abort: AbortSignal): Promise<IntakeOutcome> {
  const { mapping } = row;
  const ids = [
    mapping.counts.fileId,
    mapping.trials.fileId,
    mapping.units?.fileId,
    mapping.stimulus?.velocity.fileId,
  ];
  const files = await findSessionFiles(db(), row.lab_id, row.session_id, [
    ...new Set(ids.filter((id) => id !== undefined)),
  ]);
  const keyOf = new Map(files.map((file) => [file.id, file.object_key]));
  const sizeBytes = files.reduce((sum, file) => sum + file.size_bytes, 0);
  try {
    const { outcome } = await runReader(
      {
        kind: 'intake',
        files: files.map((file) => ({ fileId: file.id, name: file.name, sizeBytes: file.size_bytes })),
        intake: mapping,
      },
      'taken',
      {
        read: (fileId, offset, length) => objectStore().getRange(keyOf.get(fileId)!, offset, length),
        keep: (dataHash, name, bytes) =>
          objectStore().put(
            keys.dataPart(row.lab_id, row.session_id, dataHash, name),
            bytes,
            'application/vnd.apache.arrow.file',
          ),
        maxSeconds: 2 * readerSeconds(sizeBytes),
        abort,
        keepReady: true,
      },
    );
    return outcome;
  } catch (error) {
    if (!(error instanceof ReaderLost)) throw error;
    log.warn({ err: error, intakeId: row.id }, 'an intake was not read to its end');
    return { problems: [lostProblem(error)], made: null };
  }
}

async function finish(row: IntakeRow, claim: string, { made, problems }: IntakeOutcome): Promise<void> {
  const state =
    made !== null ? 'ready' : problems.some(({ severity }) => severity === 'stops') ? 'refused' : 'waiting';
  const isDone = await inTransaction(async (trx) => {
    await lockSession(trx, row.lab_id, row.session_id);
    if (!(await lockIntakeClaim(trx, row.id, claim))) return false;
    let number: number | null = null;
    if (made !== null)
      number = await insertDataVersion(trx, {
        id: v7(),
        lab_id: row.lab_id,
        session_id: row.session_id,
        intake_id: row.id,
        data_hash: made.dataHash,
        counts_hash: made.countsHash,
        n_trials: made.nTrials,
        n_units: made.nUnits,
        n_bins: made.nBins,
        bin_width_ms: row.mapping.binWidthMs,
        window_start_ms: row.mapping.windowStartMs,
        parts: made.parts,
        trial_columns: made.trialColumns,
        unit_columns: made.unitColumns,
        labels: made.labels,
        problems,
        created_by: row.created_by,
      });
    await endIntake(trx, row.id, { state: state === 'ready' ? 'done' : state, problems });
    await setSessionState(trx, row.session_id, state, problems);
    await writeAudit(
      trx,
      { actor: { labId: row.lab_id, userId: row.created_by }, requestId: `job-${row.id}` },
      {
        action: `intake.${state}`,
        subjectKind: 'session',
        subjectId: row.session_id,
        detail: {
          intakeId: row.id,
          codes: problems.map(({ code }) => code),
          ...(made === null
            ? {}
            : { dataVersion: number, dataHash: made.dataHash, countsHash: made.countsHash }),
        },
      },
    );
    return true;
  });
  if (isDone) await publishLive({ labId: row.lab_id, kind: 'session', sessionId: row.session_id, state });
}

async function giveBack(row: IntakeRow, claim: string): Promise<void> {
  await inTransaction(async (trx) => {
    if (await releaseIntake(trx, row.id, claim))
      await addToOutbox(trx, { kind: 'run-intake', payload: { id: row.id, attempt: row.attempts } });
  });
}

function interrupted(times: number): Problem {
  return {
    code: 'interrupted',
    severity: 'stops',
    message: `The intake was interrupted ${times} times and was given up.`,
    remedy: 'Submit it again; if that fails too, the files may be too large for this machine.',
    place: {},
  };
}
