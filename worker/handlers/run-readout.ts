import { randomBytes } from 'node:crypto';
import { db } from '@/db/connection';
import { claimReadout, type ReadoutEnd } from '@/db/repositories/readout-claims';
import { listReadoutParts, saveReadoutPart } from '@/db/repositories/readout-parts';
import { findSubject } from '@/db/repositories/readout-subjects';
import { findReadoutForWorker, type ReadoutRow } from '@/db/repositories/readouts';
import type { Problem } from '@/lib/contracts/problem';
import { engineVersion } from '@/lib/engine/version';
import type { JobHandler } from '@/lib/jobs/consume';
import { log } from '@/lib/log/log';
import { buildResult } from '@/lib/services/readouts/build-result';
import { exclusionsOf } from '@/lib/services/readouts/exclusions-of';
import { finishReadoutRow, returnReadoutRow } from '@/lib/services/readouts/finish-readout-row';
import { ComputeLost, type ComputeOutcome, type ComputePool } from '@/worker/compute/compute-pool';
import type { ComputeRequest } from '@/worker/compute/messages';
import { holdClaim, type Claim } from '@/worker/hold-claim';
import { pause } from '@/worker/pause';
import type { WorkerSettings } from '@/worker/settings';

/** An interrupted readout is begun again this often before it counts as failed. */
const maxAttempts = 8;

/**
 * Carries a readout out: claims its row, has it computed in a process of its own, writes what came of it. A second
 * delivery of the same job finds no row to claim and changes nothing.
 */
export function runReadout(workerId: string, pool: ComputePool, settings: WorkerSettings): JobHandler {
  return async ({ id }, { stopping }) => {
    if (stopping.aborted) return;
    const token = `${workerId}-${randomBytes(4).toString('hex')}`;
    if (!(await claimReadout(db(), id, token))) return;
    const row = await findReadoutForWorker(db(), id);
    if (!row) return;
    const claim = holdClaim({ row, token, everyMs: settings.WORKER_HEARTBEAT_MS, stopping });
    try {
      await carryOut(row, claim, pool, settings);
    } finally {
      claim.letGo();
    }
  };
}

async function carryOut(
  row: ReadoutRow,
  claim: Claim,
  pool: ComputePool,
  settings: WorkerSettings,
): Promise<void> {
  const startedAt = new Date();
  const end = (outcome: ReadoutEnd) => finishReadoutRow(row, claim.token, outcome);
  if (row.cancelRequested) return end({ state: 'cancelled' });
  if (row.attempts > maxAttempts) return end(failure([interrupted(row.attempts - 1)]));
  try {
    const request = await prepare(row, settings);
    const outcome = await computePatiently(row, request, claim, pool);
    if (outcome.kind === 'problems') return await end(failure(outcome.problems));
    return await end(doneEnd(row, request, outcome, startedAt));
  } catch (error) {
    switch (claim.abort.signal.aborted ? claim.abort.signal.reason : null) {
      case 'cancelled':
        return end({ state: 'cancelled' });
      case 'stopping':
        return returnReadoutRow(row, claim.token);
      case 'lost':
        log.warn({ readoutId: row.id }, 'the claim was lost; another worker has this readout');
        return;
    }
    if (error instanceof ComputeLost) {
      log.warn(
        { readoutId: row.id, reason: error.message },
        'a readout was interrupted and goes back to the queue',
      );
      return returnReadoutRow(row, claim.token);
    }
    log.error({ err: error, readoutId: row.id }, 'a readout failed');
    return end(failure([internal()]));
  }
}

async function prepare(row: ReadoutRow, settings: WorkerSettings): Promise<ComputeRequest> {
  const subject = await findSubject(db(), row.labId, row.dataVersionId);
  if (!subject) throw new Error(`the data version of readout ${row.id} is gone`);
  const excluded = await exclusionsOf(row.labId, row.sessionId, row.recipe);
  const finished = await listReadoutParts(db(), row.id, partPrefix);
  const { nTrials, nUnits, nBins, binWidthMs, windowStartMs } = subject;
  return {
    labId: row.labId,
    sessionId: row.sessionId,
    readoutId: row.id,
    recipe: row.recipe,
    inputsKey: row.inputsKey,
    animal: subject.animalCode,
    dataVersion: subject.dataVersion,
    dataHash: subject.dataHash,
    parts: subject.parts,
    shape: { nTrials, nUnits, nBins, binWidthMs, windowStartMs },
    excludedTrials: excluded.trials,
    excludedUnits: excluded.units,
    maxBytes: settings.WORKER_MEMORY_BYTES,
    finished: finished.map(({ payload }) => payload),
    keepPartsAboveSeconds: settings.WORKER_KEEP_PARTS_SECONDS,
  };
}

/** Pieces of another engine version are of no use, so the version is part of their names. */
const partPrefix = `${engineVersion}/`;

/** Computes; while the object store is away, waits and begins again, with the claim held. */
async function computePatiently(
  row: ReadoutRow,
  request: ComputeRequest,
  claim: Claim,
  pool: ComputePool,
): Promise<ComputeOutcome> {
  const onPart = (chunk: number, payload: Uint8Array) => {
    saveReadoutPart(db(), row.id, `${partPrefix}${chunk}`, payload).catch((error: unknown) =>
      log.debug({ err: error }, 'a finished part was not kept'),
    );
  };
  for (;;) {
    try {
      return await pool.run(request, { onProgress: claim.report, onPart }, claim.abort.signal);
    } catch (error) {
      if (claim.abort.signal.aborted || (error as { code?: unknown }).code !== 'unavailable') throw error;
      claim.report({ done: 0, total: 1_000, phase: 'Waiting for the object store', secondsLeft: null });
      await pause(2_000, claim.abort.signal);
    }
  }
}

function doneEnd(
  row: ReadoutRow,
  request: ComputeRequest,
  outcome: Extract<ComputeOutcome, { kind: 'done' }>,
  startedAt: Date,
): ReadoutEnd {
  const { counts, notes, areas, labelTrends, facts } = outcome;
  const result = buildResult(row.recipe, outcome.numbers, {
    counts,
    notes,
    areas,
    animal: request.animal,
    labelTrends,
  });
  const finishedAt = new Date();
  return {
    state: 'done',
    result,
    predictionsKey: outcome.predictionsKey,
    provenance: {
      dataHash: request.dataHash,
      dataVersion: request.dataVersion,
      recipeHash: row.recipeHash,
      seed: row.recipe.seed,
      ...facts,
      startedAt: startedAt.toISOString(),
      finishedAt: finishedAt.toISOString(),
      durationMs: finishedAt.getTime() - startedAt.getTime(),
      attempts: row.attempts,
    },
  };
}

function failure(problems: Problem[]): ReadoutEnd {
  return { state: 'failed', problems, provenance: null };
}

function interrupted(times: number): Problem {
  return {
    code: 'interrupted',
    severity: 'stops',
    message: `The computation was interrupted ${times} times and was given up.`,
    remedy: 'If it is large, try a smaller one: the machine may be short of memory. Otherwise run it again.',
    place: {},
  };
}

function internal(): Problem {
  return {
    code: 'internal',
    severity: 'stops',
    message: 'Something went wrong on our side; it has been logged with the id of this readout.',
    place: {},
  };
}
