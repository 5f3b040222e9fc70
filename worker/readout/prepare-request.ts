import { db } from '@/db/connection';
import { listReadoutParts } from '@/db/repositories/readout-parts';
import { findSubject } from '@/db/repositories/readout-subjects';
import type { ReadoutRow } from '@/db/repositories/readouts';
import { engineVersion } from '@/lib/engine/version';
import { exclusionsOf } from '@/lib/services/readouts/exclusions-of';
import type { ComputeRequest, ComputeScope } from '@/worker/compute/messages';
import type { WorkerSettings } from '@/worker/settings';

/** Kept pieces of another engine version are of no use, so the version is part of their names. */
export const partPrefix = `${engineVersion}/`;

/** Everything that a compute process must be told of a readout. */
export async function prepareRequest(
  row: ReadoutRow,
  settings: WorkerSettings,
  scope: ComputeScope,
): Promise<ComputeRequest> {
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
    scope,
  };
}
