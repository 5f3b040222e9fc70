import { db } from '@/db/connection';
import { listExclusionRows } from '@/db/repositories/exclusions';
import type { Recipe } from '@/lib/contracts/recipe';
import { applyExclusions } from '@/lib/services/exclusions/apply-exclusions';

/** The trials and units that a recipe's version of the exclusion list leaves out. */
export async function exclusionsOf(
  labId: string,
  sessionId: string,
  recipe: Pick<Recipe, 'exclusions'>,
): Promise<{ trials: number[]; units: number[] }> {
  if (recipe.exclusions === 'none') return { trials: [], units: [] };
  return applyExclusions(await listExclusionRows(db(), labId, sessionId, recipe.exclusions.version));
}
