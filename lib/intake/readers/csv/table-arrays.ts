import type { WideColumns } from '@/lib/intake/readers/csv/find-wide-columns';
import { readNumber } from '@/lib/intake/readers/csv/read-number';
import type { Dtype, ReadableArray, ReadableTable, ValueChunk } from '@/lib/intake/readers/readable-file';

/** What one pass over a column found. */
export interface ColumnTally {
  blanks: number;
  numbers: number;
  texts: number;
  isWhole: boolean;
  firstText: { line: number; cell: string } | null;
}

/**
 * The columns of a text table as arrays of one dimension; a family of wide columns as one array of rows × units × bins
 * whose path is its pattern. Blank cells of a number column read as NaN.
 */
export function tableArrays(
  table: ReadableTable,
  tallies: readonly ColumnTally[],
  wide: WideColumns | null,
): ReadableArray[] {
  const inWide = new Set(wide === null ? [] : wide.columns);
  const arrays: ReadableArray[] = [];
  if (wide !== null) {
    const { nUnits, nBins } = wide;
    const dtype = commonType([...wide.columns].map((at) => tallies[at]));
    arrays.push({
      path: wide.pattern,
      dtype,
      shape: [table.nRows, nUnits, nBins],
      order: 'C',
      chunks: () => cellsOf(table, wide.columns, dtype),
    });
  }
  table.header.forEach((name, at) => {
    if (inWide.has(at)) return;
    const dtype = commonType([tallies[at]]);
    arrays.push({
      path: name,
      dtype,
      shape: [table.nRows],
      order: 'C',
      chunks: () => cellsOf(table, [at], dtype),
    });
  });
  return arrays;
}

function commonType(tallies: readonly ColumnTally[]): Dtype {
  if (tallies.some((tally) => tally.texts > 0 || tally.numbers === 0)) return 'string';
  return tallies.every((tally) => tally.isWhole && tally.blanks === 0) ? 'int64' : 'float64';
}

async function* cellsOf(
  table: ReadableTable,
  columns: ArrayLike<number>,
  dtype: Dtype,
): AsyncGenerator<ValueChunk, void, undefined> {
  for await (const rows of table.rows()) {
    const n = rows.length * columns.length;
    if (dtype === 'string') {
      const texts: string[] = [];
      for (const row of rows) for (let at = 0; at < columns.length; at++) texts.push(row.cells[columns[at]]);
      yield texts;
      continue;
    }
    // Whole numbers of a text table are within 2^53, so doubles carry them exactly.
    const numbers = new Float64Array(n);
    let to = 0;
    for (const row of rows)
      for (let at = 0; at < columns.length; at++) numbers[to++] = readNumber(row.cells[columns[at]]) ?? NaN;
    yield numbers;
  }
}
