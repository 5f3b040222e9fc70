import type { Recipe } from '@/lib/contracts/recipe';
import type { FoldsSpec } from '@/lib/engine/readout/types';
import { codeLevels } from '@/lib/services/readouts/code-levels';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import { resolveGivenFolds } from '@/lib/services/readouts/resolve-given-folds';
import type { SessionTables } from '@/lib/services/readouts/session-tables';

/** Which optional fields each kind of folds reads; the others must be left out, so that none is ignored in silence. */
const fields: Record<Recipe['folds']['kind'], string[]> = {
  stratified: ['k', 'repeats'],
  contiguous: ['k', 'purgeTrials'],
  leaveOneGroupOut: ['groupColumn'],
  given: ['assignment', 'inner'],
};

/** Folds as the engine takes them, or what is wrong with them. */
export function resolveFolds(
  recipe: Recipe,
  tables: SessionTables,
  trialIndex: Int32Array,
): { folds: FoldsSpec } | { faults: RecipeFault[] } {
  const { folds } = recipe;
  const faults: RecipeFault[] = strayFields(folds);
  const k = folds.k ?? 0;
  if ((folds.kind === 'stratified' || folds.kind === 'contiguous') && trialIndex.length < k)
    faults.push({
      pointer: '/recipe/folds/k',
      code: 'too-few-trials',
      message: `${trialIndex.length} trials cannot make ${k} folds.`,
    });
  if (faults.length > 0) return { faults };
  switch (folds.kind) {
    case 'stratified':
      return { folds: { kind: 'stratified', k, repeats: folds.repeats ?? 1 } };
    case 'contiguous':
      return { folds: { kind: 'contiguous', k, purgeTrials: folds.purgeTrials ?? 0 } };
    case 'leaveOneGroupOut':
      return groups(folds.groupColumn, tables, trialIndex);
    case 'given':
      return resolveGivenFolds(folds, tables.nTrials, trialIndex);
  }
}

function strayFields(folds: Recipe['folds']): RecipeFault[] {
  const present = Object.entries(folds).filter(([name, value]) => name !== 'kind' && value !== undefined);
  return present
    .filter(([name]) => !fields[folds.kind].includes(name))
    .map(([name]) => ({
      pointer: `/recipe/folds/${name}`,
      code: 'not-for-this-kind',
      message: `“${name}” does not apply to ${folds.kind} folds; they take ${fields[folds.kind].join(' and ')}.`,
    }));
}

function groups(
  name: string | undefined,
  tables: SessionTables,
  trialIndex: Int32Array,
): { folds: FoldsSpec } | { faults: RecipeFault[] } {
  const pointer = '/recipe/folds/groupColumn';
  const column = tables.trials.find((candidate) => candidate.name === name);
  if (!column)
    return {
      faults: [
        { pointer, code: 'required', message: 'Name the trial column whose groups are left out in turn.' },
      ],
    };
  const { codes, names } = codeLevels(column);
  const nGroups = new Set(Array.from(trialIndex, (trial) => codes[trial])).size;
  if (nGroups < 2)
    return {
      faults: [
        {
          pointer,
          code: 'too-few-groups',
          message: `All trials that take part have the same “${name}”; two groups at least are needed.`,
        },
      ],
    };
  return { folds: { kind: 'leaveOneGroupOut', group: codes, names } };
}
