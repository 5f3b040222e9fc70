import { resultSchema, type Interval, type ReadoutResult } from '@/lib/contracts/readout';
import type { Problem } from '@/lib/contracts/problem';
import type { Recipe } from '@/lib/contracts/recipe';
import type { ReadoutNumbers } from '@/lib/engine/readout/types';
import { buildVerdict } from '@/lib/reports/verdict/build-verdict';
import type { VerdictNull } from '@/lib/reports/verdict/verdict-facts';
import { recipeWords } from '@/lib/services/readouts/recipe-words';
import type { ResolvedRecipe } from '@/lib/services/readouts/resolve-recipe';
import { toPlain } from '@/lib/services/readouts/to-plain';

/**
 * The result that is kept and shown, from the engine's numbers. Pure.
 * @throws when a number is NaN or infinite or a part is missing: a fault of ours, never stored
 */
export function buildResult(
  recipe: Recipe,
  numbers: Omit<ReadoutNumbers, 'predictions' | 'trialsUsed'>,
  facts: {
    counts: ResolvedRecipe['counts'];
    notes: Problem[];
    areas: string[];
    animal: string;
    labelTrends: boolean;
  },
): ReadoutResult {
  const { nFeatures, warnings, ...kept } = numbers;
  const { heldOut } = numbers;
  const verdict = buildVerdict({
    animal: facts.animal,
    areas: facts.areas,
    label: recipeWords.label(recipe),
    window: recipe.window,
    nTrials: facts.counts.trialsUsed,
    nFeatures,
    estimatorWords: recipeWords.estimator(recipe),
    r2: heldOut.r2,
    interval: heldOut.r2Interval,
    null: verdictNull(recipe, numbers.null),
    controls: numbers.controls.map((control, at) => ({
      kind: control.kind,
      subjects: recipeWords.control(recipe, at),
      outcome: control.outcome,
      r2: numberOf(control.heldOut?.r2),
      interval: intervalOf(control.heldOut),
    })),
    smallestEffect: null,
    labelTrends: facts.labelTrends,
  });
  return resultSchema.parse(
    toPlain({
      ...kept,
      warnings: [...facts.notes, ...warnings],
      counts: { ...facts.counts, features: nFeatures },
      verdict,
    }),
  );
}

function verdictNull(recipe: Recipe, control: ReadoutNumbers['null']): VerdictNull | null {
  if (!control) return null;
  const { p, smallestP, draws, quantiles } = control;
  const { q025, q95, q975, max } = quantiles;
  if (p === null || smallestP === null || q025 === null || q95 === null || q975 === null || max === null)
    return null;
  return { scheme: recipeWords.shuffle(recipe), draws, p, smallestP, q025, q95, q975, max };
}

/** The interval that a control's numbers carry, where they do. */
function intervalOf(heldOut: Record<string, unknown> | null): Interval | null {
  const low = numberOf(heldOut?.low);
  const high = numberOf(heldOut?.high);
  return low === null || high === null
    ? null
    : { low, high, level: 0.95, method: 'test-trial interval, readouts held fixed' };
}

function numberOf(value: unknown): number | null {
  return typeof value === 'number' ? value : null;
}
