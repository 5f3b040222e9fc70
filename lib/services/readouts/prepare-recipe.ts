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
import { findPermutations } from '@/lib/services/readouts/find-permutations';
import { findSequences } from '@/lib/services/readouts/find-sequences';
import type { Permutations } from '@/lib/services/readouts/readout-inputs';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import type { ResolvedRecipe } from '@/lib/services/readouts/resolve-recipe';
import { sessionParts } from '@/lib/services/readouts/session-parts';

export interface PreparedRecipe {
  subject: ReadoutSubject;
  recipe: Recipe;
  faults: RecipeFault[];
  /** null where there are faults. */
  resolved: ResolvedRecipe | null;
  /** The given permutations, wherever they came from; null without. */
  permutations: Permutations | null;
  /** Label sequences of other sessions; null where the null does not use them. */
  sequences: Float64Array[] | null;
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
      permutations: null,
      sequences: null,
      faults: [
        {
          pointer: '/recipe/exclusions/version',
          code: 'no-such-version',
          message: `The exclusion list is at version ${version}; there is no version ${recipe.exclusions.version} yet.`,
        },
      ],
    };
  const excluded = await exclusionsOf(labId, sessionId, recipe);
  const tables = await loadSessionTables(sessionParts({ labId, ...subject }), subject);
  const permutations = await findPermutations(labId, sessionId, recipe.null);
  const sequences = recipe.null.kind === 'sessions' ? await findSequences(labId, sessionId, recipe) : null;
  const checked = checkRecipe(recipe, tables, {
    excludedTrials: excluded.trials,
    excludedUnits: excluded.units,
    ...(permutations.rows ? { permutations: permutations.rows } : {}),
    ...(sequences ? { sequences } : {}),
  });
  // What is wrong with a file is told instead of "there are no permutations", which follows from it.
  const faults = [
    ...permutations.faults,
    ...('faults' in checked ? checked.faults : []).filter(
      ({ pointer }) => permutations.faults.length === 0 || pointer !== '/recipe/null/permutations',
    ),
  ];
  if (faults.length > 0 || 'faults' in checked)
    return { subject, recipe, faults, resolved: null, permutations: null, sequences: null };
  const draws = permutations.rows?.length ?? sequences?.length ?? recipe.null.draws;
  const drawn = draws === undefined ? recipe : { ...recipe, null: { ...recipe.null, draws } };
  return {
    subject,
    recipe: drawn,
    faults: [],
    resolved: checked.resolved,
    permutations: permutations.matrix,
    sequences,
  };
}
