import type { Condition } from '@/lib/contracts/recipe';
import type { Column } from '@/lib/intake/column';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';

/**
 * Which rows meet all conditions (1) and which do not (0). A missing value meets none, "!=" included.
 * @returns faults where a column is unknown or a condition does not fit its type
 */
export function matchConditions(
  conditions: Condition[],
  columns: Column[],
  nRows: number,
  pointer: string,
): { rows: Uint8Array; faults: RecipeFault[] } {
  const rows = new Uint8Array(nRows).fill(1);
  const faults: RecipeFault[] = [];
  conditions.forEach((condition, index) => {
    const column = columns.find(({ name }) => name === condition.column);
    if (!column) {
      faults.push({
        pointer: `${pointer}/${index}/column`,
        code: 'unknown-column',
        message: `There is no column “${condition.column}”. There are: ${columns.map(({ name }) => name).join(', ')}.`,
      });
      return;
    }
    const fault = faultOf(condition, column);
    if (fault) {
      faults.push({ pointer: `${pointer}/${index}/value`, code: 'condition-type', message: fault });
      return;
    }
    for (let row = 0; row < nRows; row++) if (!matches(condition, column.values[row])) rows[row] = 0;
  });
  return { rows, faults };
}

function faultOf({ op, value, column: name }: Condition, column: Column): string | null {
  if ((op === 'in') !== Array.isArray(value))
    return op === 'in' ? '“in” needs a list of values.' : `“${op}” needs one value, not a list.`;
  const wanted = column.type === 'category' ? 'string' : 'number';
  if ([value].flat().some((item) => typeof item !== wanted))
    return `Column “${name}” holds ${wanted === 'string' ? 'names' : 'numbers'}; the condition compares it with something else.`;
  if (column.type === 'category' && op.startsWith('<')) return `“${op}” does not apply to names.`;
  if (column.type === 'category' && op.startsWith('>')) return `“${op}” does not apply to names.`;
  return null;
}

function matches({ op, value }: Condition, cell: number | string | null): boolean {
  if (cell === null || Number.isNaN(cell)) return false;
  if (Array.isArray(value)) return value.includes(cell);
  switch (op) {
    case '=':
      return cell === value;
    case '!=':
      return cell !== value;
    case '<':
      return cell < value;
    case '<=':
      return cell <= value;
    case '>':
      return cell > value;
    case '>=':
      return cell >= value;
    default:
      return false;
  }
}
