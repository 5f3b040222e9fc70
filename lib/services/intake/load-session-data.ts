import { db } from '@/db/connection';
import { findDataVersion, type DataVersionRow } from '@/db/repositories/data-versions';
import { readColumns } from '@/lib/intake/canonical/read-columns';
import { readPart } from '@/lib/intake/canonical/read-part';
import type { Column } from '@/lib/intake/column';
import type { DerivedFacts } from '@/lib/intake/derive-facts';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { dataParts } from '@/lib/services/intake/data-parts';
import { derivedFactsOf } from '@/lib/services/intake/derived-facts-of';
import { notFound } from '@/lib/services/not-found';

/** The tables of one data version. */
export interface SessionTables {
  version: DataVersionRow;
  trials: Column[];
  units: Column[];
  derived: DerivedFacts;
}

/**
 * A data version's trial and unit tables and what follows from its counts.
 * @param input `dataVersion` is a version's number; the newest if it is left out
 * @throws AppError('not-found') where the session is not in the lab or has no such data
 */
export async function loadTables(
  ctx: Ctx,
  input: { sessionId: string; dataVersion?: number },
): Promise<SessionTables> {
  authorize(ctx, 'session.read');
  const version = await findDataVersion(db(), ctx.actor.labId, input.sessionId, input.dataVersion);
  if (version === null) throw notFound();
  const source = dataParts(version);
  const [trials, units, derived] = await Promise.all([
    readPart(source, 'trials'),
    readPart(source, 'units'),
    derivedFactsOf(version),
  ]);
  if (trials === null || units === null) throw new Error(`data version ${version.id} lacks a table`);
  return { version, trials: readColumns(trials), units: readColumns(units), derived };
}
