import type { ReadoutRow } from '@/db/repositories/readouts';
import type { Readout } from '@/lib/contracts/readout';

/** A readout as members and programs see it. */
export function toReadout(row: ReadoutRow): Readout {
  return {
    id: row.id,
    sessionId: row.sessionId,
    number: row.number,
    state: row.state,
    progress: row.progress,
    recipe: row.recipe,
    result: row.result,
    provenance: row.provenance,
    problems: row.problems,
    authorId: row.authorId,
    authorName: row.authorName,
    createdAt: row.createdAt.toISOString(),
    finishedAt: row.finishedAt?.toISOString() ?? null,
  };
}
