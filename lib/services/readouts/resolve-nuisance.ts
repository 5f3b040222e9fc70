import type { NuisanceColumn } from '@/lib/contracts/recipe';
import type { NuisanceVariable } from '@/lib/engine/readout/types';
import { codeLevels } from '@/lib/services/readouts/code-levels';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import type { SessionTables } from '@/lib/services/readouts/session-tables';

/** Nuisance columns as the engine takes them: numbers, category codes, or degrees with a period. */
export function resolveNuisance(
  columns: NuisanceColumn[],
  tables: SessionTables,
  pointer: string,
): { variables: NuisanceVariable[]; faults: RecipeFault[] } {
  const faults: RecipeFault[] = [];
  const variables = columns.flatMap(({ column: name, term }, at): NuisanceVariable[] => {
    const column = tables.trials.find((candidate) => candidate.name === name);
    if (!column) return []; // the choice of trials has told this fault already
    if (term === 'category') return [{ name, term, values: Float64Array.from(codeLevels(column).codes) }];
    if (column.type === 'category') {
      faults.push({
        pointer: `${pointer}/${at}/term`,
        code: 'nuisance-term',
        message: `“${name}” holds names: its term must be “category”, not “${term}”.`,
      });
      return [];
    }
    return [
      {
        name,
        term,
        values: column.values,
        ...(column.type === 'circular' ? { periodDeg: column.periodDeg ?? 360 } : {}),
      },
    ];
  });
  return { variables, faults };
}
