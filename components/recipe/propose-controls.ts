import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import type { ControlRecipe, NuisanceColumn } from '@/lib/contracts/recipe';

/**
 * The controls that run unless a member takes them away: a window before the event where there is one, the nuisances
 * alone and what the units add to them, total rate, and trial order.
 */
export function proposeControls(facts: RecipeFacts, nuisances: readonly NuisanceColumn[]): ControlRecipe[] {
  const { windowStartMs, binWidthMs, nBins } = facts;
  const before = Math.min(nBins, Math.floor(-windowStartMs / binWidthMs + 1e-9));
  const columns = [...nuisances];
  return [
    ...(before >= 1
      ? [{ kind: 'window' as const, startMs: windowStartMs, endMs: windowStartMs + before * binWidthMs }]
      : []),
    ...(columns.length > 0
      ? [
          { kind: 'nuisanceOnly' as const, columns },
          { kind: 'incremental' as const, columns },
        ]
      : []),
    { kind: 'totalRate' },
    { kind: 'trialOrder' },
  ];
}
