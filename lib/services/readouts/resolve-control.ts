import type { ControlRecipe } from '@/lib/contracts/recipe';
import type { ControlSpec } from '@/lib/engine/readout/types';
import { codeLevels } from '@/lib/services/readouts/code-levels';
import { findBins } from '@/lib/services/readouts/find-bins';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import { resolveNuisance } from '@/lib/services/readouts/resolve-nuisance';
import type { SessionTables } from '@/lib/services/readouts/session-tables';

/** One control as the engine takes it, or what is wrong with it. */
export function resolveControl(
  control: ControlRecipe,
  tables: SessionTables,
  pointer: string,
): { spec: ControlSpec } | { faults: RecipeFault[] } {
  switch (control.kind) {
    case 'nuisanceOnly':
    case 'incremental':
    case 'adjusted': {
      const { variables, faults } = resolveNuisance(control.columns, tables, `${pointer}/columns`);
      return faults.length > 0 ? { faults } : { spec: { kind: control.kind, columns: variables } };
    }
    case 'window': {
      const bins = findBins(tables, control);
      if ('fault' in bins)
        return {
          faults: [{ pointer: `${pointer}/${bins.fault}`, code: 'window-edge', message: bins.message }],
        };
      return { spec: control };
    }
    case 'matched': {
      const column = tables.trials.find(({ name }) => name === control.column)!;
      const isCategory = column.type === 'category';
      const values = column.type === 'category' ? Float64Array.from(codeLevels(column).codes) : column.values;
      return { spec: { kind: 'matched', column: control.column, values, isCategory, draws: control.draws } };
    }
    case 'generalise':
      return generalise(control, tables, pointer);
    default:
      return { spec: control };
  }
}

function generalise(
  control: Extract<ControlRecipe, { kind: 'generalise' }>,
  tables: SessionTables,
  pointer: string,
): { spec: ControlSpec } | { faults: RecipeFault[] } {
  const column = tables.trials.find(({ name }) => name === control.column)!;
  const levels = new Set<number | string | null>(column.values);
  const faults: RecipeFault[] = [];
  for (const side of ['train', 'test'] as const)
    control[side].forEach((level, at) => {
      if (!levels.has(level))
        faults.push({
          pointer: `${pointer}/${side}/${at}`,
          code: 'no-such-level',
          message: `No trial has “${level}” in “${control.column}”.`,
        });
      else if (side === 'test' && control.train.includes(level))
        faults.push({
          pointer: `${pointer}/test/${at}`,
          code: 'level-on-both-sides',
          message: `“${level}” is a training level already; a level is on one side only.`,
        });
    });
  if (faults.length > 0) return { faults };
  const side = Int8Array.from(column.values as ArrayLike<number | string>, (value: number | string) =>
    control.train.includes(value) ? 0 : control.test.includes(value) ? 1 : -1,
  );
  return {
    spec: {
      kind: 'generalise',
      column: control.column,
      side,
      trainNames: control.train.map(String),
      testNames: control.test.map(String),
    },
  };
}
