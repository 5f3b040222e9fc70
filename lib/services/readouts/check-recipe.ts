import type { Recipe } from '@/lib/contracts/recipe';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import { resolveRecipe, type ResolvedRecipe } from '@/lib/services/readouts/resolve-recipe';
import type { SessionTables } from '@/lib/services/readouts/session-tables';

type Given = Parameters<typeof resolveRecipe>[2];

/**
 * Checks a filled recipe against the tables alone. A unit rule by rate or presence needs the counts, which a request
 * does not read: that part is left to the worker, and all units count as chosen by it here.
 */
export function checkRecipe(
  recipe: Recipe,
  tables: SessionTables,
  given: Given,
): { resolved: ResolvedRecipe } | { faults: RecipeFault[] } {
  if (!('rule' in recipe.units) || tables.unitFacts !== null) return resolveRecipe(recipe, tables, given);
  const { where } = recipe.units.rule;
  return resolveRecipe({ ...recipe, units: { rule: { ...(where ? { where } : {}) } } }, tables, given);
}
