import type { ByteSource } from '@/lib/intake/byte-source';
import type { Problem } from '@/lib/contracts/problem';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { parseRows } from '@/lib/intake/readers/csv/parse-rows';
import { readNumber } from '@/lib/intake/readers/csv/read-number';
import { recogniseWide } from '@/lib/intake/readers/csv/recognise-wide';
import { sniffDelimiter } from '@/lib/intake/readers/csv/sniff-delimiter';
import { tableArrays, type ColumnTally } from '@/lib/intake/readers/csv/table-arrays';
import type { ReadableFile, ReadableTable, TableRow } from '@/lib/intake/readers/readable-file';

const MAX_COLUMNS = 500_000;

/**
 * Opens a comma- or tab-separated text table: one pass checks the encoding, the header and every row's length and finds
 * each column's type. Later reads parse again, so nothing but the header is held.
 */
export async function openCsv(source: ByteSource): Promise<ReadableFile> {
  const delimiter = await sniffDelimiter(source);
  let header: string[] | null = null;
  let tallies: ColumnTally[] = [];
  let nRows = 0;
  for await (const batch of parseRows(source, delimiter))
    for (const row of batch) {
      if (header === null) {
        header = checkHeader(row);
        tallies = header.map(() => ({ blanks: 0, numbers: 0, texts: 0, isWhole: true, firstText: null }));
        continue;
      }
      checkLength(row, header);
      nRows += 1;
      tallyRow(row, tallies);
    }
  if (header === null)
    throw new IntakeRefusal('csv-empty', 'The file holds no rows.', 'Export the table again.');
  if (nRows === 0)
    throw new IntakeRefusal('csv-empty', 'The file holds a header and no rows.', 'Export the table again.', {
      line: 1,
    });
  const names = header;
  const table: ReadableTable = { header: names, nRows, rows: () => dataRows(source, delimiter) };
  const wide = recogniseWide(names);
  return {
    format: 'csv',
    arrays: tableArrays(table, tallies, wide),
    table,
    problems: mixedColumns(names, tallies),
    close: () => undefined,
  };
}

async function* dataRows(
  source: ByteSource,
  delimiter: ',' | '\t',
): AsyncGenerator<TableRow[], void, undefined> {
  let isFirst = true;
  for await (const batch of parseRows(source, delimiter)) {
    const rows = isFirst ? batch.slice(1) : batch;
    isFirst = false;
    if (rows.length > 0) yield rows;
  }
}

function checkHeader(row: TableRow): string[] {
  const names = row.cells.map((cell) => cell.trim());
  const { line } = row;
  if (names.length > MAX_COLUMNS)
    throw new IntakeRefusal(
      'csv-columns',
      `The header has ${names.length} columns; at most ${MAX_COLUMNS} are read.`,
      'Use the long form of counts.',
      { line },
    );
  const seen = new Map<string, number>();
  names.forEach((name, at) => {
    if (name === '')
      throw new IntakeRefusal(
        'csv-header-blank',
        `Column ${at + 1} has no name.`,
        'Name every column in the first line.',
        { line, column: at + 1 },
      );
    const before = seen.get(name);
    if (before !== undefined)
      throw new IntakeRefusal(
        'csv-header-duplicate',
        `Columns ${before + 1} and ${at + 1} are both named “${name}”.`,
        'Give each column a name of its own.',
        { line, column: at + 1 },
      );
    seen.set(name, at);
  });
  if (names.every((name) => readNumber(name) !== null))
    throw new IntakeRefusal(
      'csv-header-missing',
      'The first line holds only numbers, so the columns have no names.',
      'Put a line with the names of the columns first.',
      { line },
    );
  return names;
}

function checkLength(row: TableRow, header: readonly string[]): void {
  if (row.cells.length === header.length) return;
  const { line } = row;
  const blank = row.cells.length === 1 && row.cells[0] === '';
  throw new IntakeRefusal(
    'csv-ragged',
    blank
      ? `Line ${line} is blank in the middle of the table.`
      : `Line ${line} has ${row.cells.length} cells; the header has ${header.length}.`,
    blank ? 'Remove the line.' : 'Give every row one cell a column; quote cells that hold the separator.',
    { line, column: Math.min(row.cells.length, header.length) + (row.cells.length > header.length ? 1 : 0) },
  );
}

function tallyRow(row: TableRow, tallies: ColumnTally[]): void {
  for (let at = 0; at < tallies.length; at++) {
    const cell = row.cells[at];
    const tally = tallies[at];
    if (cell.length === 0 || cell.trim() === '') {
      tally.blanks += 1;
      continue;
    }
    const value = readNumber(cell);
    if (value === null) {
      tally.texts += 1;
      tally.firstText ??= { line: row.line, cell };
    } else {
      tally.numbers += 1;
      if (!Number.isSafeInteger(value)) tally.isWhole = false;
    }
  }
}

/** Columns that hold mostly numbers and some text: a slip more often than a category. */
function mixedColumns(header: readonly string[], tallies: readonly ColumnTally[]): Problem[] {
  return tallies.flatMap((tally, at): Problem[] => {
    if (tally.firstText === null || tally.numbers <= tally.texts) return [];
    const { line, cell } = tally.firstText;
    const comma = /^[+-]?\d+,\d+$/.test(cell.trim());
    return [
      {
        code: comma ? 'csv-decimal-comma' : 'csv-mixed-column',
        severity: 'warns',
        message: `Column “${header[at]}” holds numbers, but line ${line} reads “${cell.slice(0, 40)}”${comma ? ', with a decimal comma' : ''}.`,
        remedy: comma ? 'Write decimal points.' : 'Correct the cell, or use the column as a category.',
        place: { line, column: at + 1 },
      },
    ];
  });
}
