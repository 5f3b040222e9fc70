import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import type { Condition, RecipeInput } from '@/lib/contracts/recipe';

type Value = number | string;

function holds(found: Value | null | undefined, op: Condition['op'], value: Condition['value']): boolean {
  if (found === null || found === undefined) return false;
  const wanted = Array.isArray(value) ? value : [value];
  const [first] = wanted;
  switch (op) {
    case '=':
      return found === first;
    case '!=':
      return found !== first;
    case '<':
      return found < first;
    case '<=':
      return found <= first;
    case '>':
      return found > first;
    case '>=':
      return found >= first;
    case 'in':
      return wanted.includes(found);
  }
}

function unitsIn(recipe: RecipeInput, facts: RecipeFacts): number {
  const out = new Set(facts.excludedUnits);
  const { units } = recipe;
  return facts.units.filter((unit, index) => {
    if (out.has(index)) return false;
    if (!units || 'all' in units) return true;
    if ('ids' in units) return units.ids.includes(index);
    const { minRateHz, minPresence, where } = units.rule;
    return (
      (minRateHz === undefined || unit.rateHz >= minRateHz) &&
      (minPresence === undefined || unit.presence >= minPresence) &&
      (where ?? []).every((condition) =>
        condition.column === facts.areaColumn && condition.op === '=' ? unit.area === condition.value : true,
      )
    );
  }).length;
}

/** Numbers that the checks and the sentence of the recipe share. */
export function countRecipe(
  recipe: RecipeInput,
  facts: RecipeFacts,
): { trialsUsed: number; unitsUsed: number } {
  const label = facts.trialColumns.find((column) => column.name === recipe.label);
  const out = new Set(facts.excludedTrials);
  const condition = recipe.trials && 'where' in recipe.trials ? recipe.trials.where : [];
  const ids = recipe.trials && 'ids' in recipe.trials ? new Set(recipe.trials.ids) : null;
  let used = 0;
  for (let trial = 0; trial < facts.nTrials; trial += 1) {
    if (out.has(trial) || label?.values[trial] == null || (ids && !ids.has(trial))) continue;
    const isChosen = condition.every(({ column, op, value }) =>
      holds(facts.trialColumns.find((candidate) => candidate.name === column)?.values[trial], op, value),
    );
    if (isChosen) used += 1;
  }
  return { trialsUsed: used, unitsUsed: unitsIn(recipe, facts) };
}
