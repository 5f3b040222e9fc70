import type { Column } from '@/lib/intake/column';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';

/** A cell as a key for matching: numbers by value, so that `7`, `7.0` and `07` are one; text trimmed. */
export function rowKey(cell: string): string {
  const text = cell.trim();
  const value = text === '' ? NaN : Number(text);
  return Number.isNaN(value) ? text : String(value);
}

/**
 * The row that each value of an identifying column stands for.
 * @throws IntakeRefusal where a value is missing or comes twice, since then counts cannot be matched to rows
 */
export function numberRows(column: Column, kind: 'trial' | 'unit', fileName: string): Map<string, number> {
  const rows = new Map<string, number>();
  for (let row = 0; row < column.values.length; row++) {
    const value = column.values[row];
    const place = { file: fileName, path: column.name, [kind]: row };
    if (value === null || (typeof value === 'number' && Number.isNaN(value)))
      throw new IntakeRefusal(
        `${kind}-id-missing`,
        `A ${kind} has no entry in “${column.name}”, by which counts are matched.`,
        'Fill it in.',
        place,
      );
    const key = rowKey(String(value));
    if (rows.has(key))
      throw new IntakeRefusal(
        `${kind}-id-duplicate`,
        `“${column.name}” holds ${key} twice, so counts cannot be matched by it.`,
        `Give each ${kind} an identifier of its own.`,
        place,
      );
    rows.set(key, row);
  }
  return rows;
}
