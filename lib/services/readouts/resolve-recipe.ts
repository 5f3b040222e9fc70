import type { Problem } from '@/lib/contracts/problem';
import type { Recipe } from '@/lib/contracts/recipe';
import type { ControlSpec, ReadoutInput } from '@/lib/engine/readout/types';
import { findBins } from '@/lib/services/readouts/find-bins';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import { resolveControl } from '@/lib/services/readouts/resolve-control';
import { resolveFolds } from '@/lib/services/readouts/resolve-folds';
import { resolveNuisance } from '@/lib/services/readouts/resolve-nuisance';
import { resolveNull, type NullInputs } from '@/lib/services/readouts/resolve-null';
import { selectTrials } from '@/lib/services/readouts/select-trials';
import { selectUnits } from '@/lib/services/readouts/select-units';
import type { SessionTables } from '@/lib/services/readouts/session-tables';

/** A readout's input but for the counts, and which bins of them it needs. */
export interface ResolvedRecipe {
  input: Omit<ReadoutInput, 'counts' | 'nBins' | 'windowStartMs'>;
  bins: { binFrom: number; binTo: number };
  counts: {
    trialsAll: number;
    trialsUsed: number;
    trialsExcluded: number;
    trialsMissing: number;
    unitsAll: number;
    unitsUsed: number;
  };
  notes: Problem[];
}

/**
 * Turns a filled recipe into what the engine takes, against a session's tables and the exclusions of the recipe's
 * version. Pure. All faults come at once, each with its pointer.
 */
export function resolveRecipe(
  recipe: Recipe,
  tables: SessionTables,
  given: { excludedTrials: readonly number[]; excludedUnits: readonly number[] } & NullInputs,
): { resolved: ResolvedRecipe } | { faults: RecipeFault[] } {
  const faults: RecipeFault[] = [];
  const bins = findBins(tables, recipe.window);
  if ('fault' in bins)
    faults.push({ pointer: `/recipe/window/${bins.fault}`, code: 'window-edge', message: bins.message });
  const units = selectUnits(recipe, tables, new Set(given.excludedUnits));
  if ('faults' in units) faults.push(...units.faults);
  const trials = selectTrials(recipe, tables, new Set(given.excludedTrials));
  if ('faults' in trials) return { faults: [...faults, ...trials.faults] };
  const { trialIndex, y, nExcluded, nMissing, notes } = trials.selection;

  const folds = resolveFolds(recipe, tables, trialIndex);
  if ('faults' in folds) faults.push(...folds.faults);
  const nullPart = resolveNull(recipe, tables, trialIndex.length, given);
  if ('faults' in nullPart) faults.push(...nullPart.faults);
  const nuisance = resolveNuisance(recipe.nuisance.columns, tables, '/recipe/nuisance/columns');
  faults.push(...nuisance.faults);
  const controls: ControlSpec[] = [];
  recipe.controls.forEach((control, at) => {
    const resolved = resolveControl(control, tables, `/recipe/controls/${at}`);
    if ('faults' in resolved) faults.push(...resolved.faults);
    else controls.push(resolved.spec);
  });
  if (faults.length > 0 || 'faults' in folds || 'faults' in nullPart || 'faults' in units || 'fault' in bins)
    return { faults };

  return {
    resolved: {
      input: {
        nTrials: tables.nTrials,
        nUnits: tables.nUnits,
        binWidthMs: tables.binWidthMs,
        y,
        labelName: recipe.label,
        trialIndex,
        unitIndex: units.unitIndex,
        window: recipe.window,
        features: recipe.features,
        transform: recipe.transform,
        estimator: recipe.estimator,
        folds: folds.folds,
        nuisance: { variables: nuisance.variables, handling: recipe.nuisance.handling },
        nullScheme: nullPart.nullScheme,
        controls,
        views: recipe.views,
        seed: recipe.seed,
      },
      bins: neededBins(recipe, tables, bins),
      counts: {
        trialsAll: tables.nTrials,
        trialsUsed: trialIndex.length,
        trialsExcluded: nExcluded,
        trialsMissing: nMissing,
        unitsAll: tables.nUnits,
        unitsUsed: units.unitIndex.length,
      },
      notes,
    },
  };
}

/** Views that slide along the recording need all bins; else the window and the controls' windows are enough. */
function neededBins(
  recipe: Recipe,
  tables: SessionTables,
  own: { binFrom: number; binTo: number },
): ResolvedRecipe['bins'] {
  if (recipe.views.some(({ kind }) => kind === 'timeCourse' || kind === 'temporalGeneralisation'))
    return { binFrom: 0, binTo: tables.nBins };
  let { binFrom, binTo } = own;
  for (const control of recipe.controls) {
    if (control.kind !== 'window') continue;
    const bins = findBins(tables, control);
    if ('fault' in bins) continue;
    binFrom = Math.min(binFrom, bins.binFrom);
    binTo = Math.max(binTo, bins.binTo);
  }
  return { binFrom, binTo };
}
