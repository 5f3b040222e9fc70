import { createHash } from 'node:crypto';
import { db } from '@/db/connection';
import { listExclusionRows } from '@/db/repositories/exclusions';
import { findNewestSubject, type ReadoutSubject } from '@/db/repositories/readout-subjects';
import { findSession } from '@/db/repositories/recording-sessions';
import type { Recipe, RecipeInput } from '@/lib/contracts/recipe';
import { AppError } from '@/lib/errors/app-error';
import { notFound } from '@/lib/services/not-found';
import { checkRecipe } from '@/lib/services/readouts/check-recipe';
import { exclusionsOf } from '@/lib/services/readouts/exclusions-of';
import { fillRecipe } from '@/lib/services/readouts/fill-recipe';
import { loadSessionTables } from '@/lib/services/readouts/load-session-tables';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import type { ResolvedRecipe } from '@/lib/services/readouts/resolve-recipe';
import { sessionParts } from '@/lib/services/readouts/session-parts';

export interface PreparedRecipe {
  subject: ReadoutSubject;
  recipe: Recipe;
  faults: RecipeFault[];
  /** null where there are faults. */
  resolved: ResolvedRecipe | null;
}

/**
 * Fills a recipe for a session of the lab and checks it against the session's newest data.
 * @param seedFrom what the seed is derived from when the recipe names none
 * @throws AppError not-found for another lab's session, conflict for one without data
 */
export async function prepareRecipe(
  labId: string,
  sessionId: string,
  input: RecipeInput,
  seedFrom: string,
): Promise<PreparedRecipe> {
  if ((await findSession(db(), labId, sessionId)) === null) throw notFound();
  const subject = await findNewestSubject(db(), labId, sessionId);
  if (subject === null)
    throw new AppError('conflict', 'This session has no data yet: bring its files in first.');
  const version = (await listExclusionRows(db(), labId, sessionId)).at(-1)?.version ?? 0;
  const seed = createHash('sha256').update(seedFrom).digest().readUInt32BE(0);
  const recipe = fillRecipe(input, { ...subject, exclusionsVersion: version, seed });
  if (recipe.exclusions !== 'none' && recipe.exclusions.version > version)
    return {
      subject,
      recipe,
      resolved: null,
      faults: [
        {
          pointer: '/recipe/exclusions/version',
          code: 'no-such-version',
          message: `The exclusion list is at version ${version}; there is no version ${recipe.exclusions.version} yet.`,
        },
      ],
    };
  const excluded = await exclusionsOf(labId, sessionId, recipe);
  const tables = await loadSessionTables(sessionParts({ labId, sessionId, ...subject }), subject);
  const { permutations } = recipe.null;
  const checked = checkRecipe(recipe, tables, {
    excludedTrials: excluded.trials,
    excludedUnits: excluded.units,
    ...(Array.isArray(permutations) ? { permutations } : {}),
  });
  return 'faults' in checked
    ? { subject, recipe, faults: checked.faults, resolved: null }
    : { subject, recipe, faults: [], resolved: checked.resolved };
}
