import { db } from '@/db/connection';
import { listSiblingSubjects } from '@/db/repositories/readout-subjects';
import type { Recipe } from '@/lib/contracts/recipe';
import { loadSessionTables } from '@/lib/services/readouts/load-session-tables';
import { sessionParts } from '@/lib/services/readouts/session-parts';
import { transformLabel } from '@/lib/services/readouts/transform-label';

/** More sessions than this are not read for one readout. */
const mostSessions = 1_000;

/**
 * The label's sequence in each of the study's other sessions that has it as numbers, in the sessions' order and each in
 * its own trial order, without missing values. What they are now is kept with the readout.
 */
export async function findSequences(
  labId: string,
  sessionId: string,
  recipe: Pick<Recipe, 'label' | 'labelTransform'>,
): Promise<Float64Array[]> {
  const sequences: Float64Array[] = [];
  for (const subject of await listSiblingSubjects(db(), labId, sessionId, mostSessions)) {
    const tables = await loadSessionTables(sessionParts({ labId, ...subject }), subject);
    const column = tables.trials.find(({ name }) => name === recipe.label);
    if (column?.type !== 'number') continue;
    const sequence = transformLabel(column.values, recipe.labelTransform).filter(Number.isFinite);
    if (sequence.length > 1) sequences.push(sequence);
  }
  return sequences;
}
