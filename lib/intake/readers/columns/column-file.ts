import type { FileFormat } from '@/lib/contracts/file';
import type { Problem } from '@/lib/contracts/problem';
import type { Dtype, ReadableFile, TableRow, ValueChunk } from '@/lib/intake/readers/readable-file';

const ROWS_AT_ONCE = 10_000;

/** A column whose values are in memory: numbers (NaN for missing), or text (null for missing). */
export interface HeldColumn {
  name: string;
  dtype: Dtype;
  values: Float64Array | BigInt64Array | (string | null)[];
}

/** Columns of one length as a file: each an array of one axis, all together a table for the long and wide forms of counts. */
export function columnFile(
  format: FileFormat,
  columns: readonly HeldColumn[],
  problems: Problem[] = [],
): ReadableFile {
  const nRows = columns[0]?.values.length ?? 0;
  const cell = (column: HeldColumn, row: number): string => {
    const value = column.values[row];
    return value === null || (typeof value === 'number' && Number.isNaN(value)) ? '' : String(value);
  };
  return {
    format,
    arrays: columns.map((column) => ({
      path: column.name,
      dtype: column.dtype,
      shape: [column.values.length],
      order: 'C',
      async *chunks(): AsyncGenerator<ValueChunk, void, undefined> {
        const { values } = column;
        yield Array.isArray(values) ? values.map((value) => value ?? '') : values;
      },
    })),
    table: {
      header: columns.map((column) => column.name),
      nRows,
      async *rows(): AsyncGenerator<TableRow[], void, undefined> {
        for (let from = 0; from < nRows; from += ROWS_AT_ONCE) {
          const n = Math.min(ROWS_AT_ONCE, nRows - from);
          yield Array.from({ length: n }, (_, at) => ({
            cells: columns.map((column) => cell(column, from + at)),
            line: from + at + 1,
          }));
        }
      },
    },
    problems,
    close: () => undefined,
  };
}
