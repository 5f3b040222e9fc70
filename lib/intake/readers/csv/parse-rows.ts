import { CsvError, parse, type Info } from 'csv-parse';
import type { ByteSource } from '@/lib/intake/byte-source';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { streamLines } from '@/lib/intake/readers/csv/stream-lines';
import type { TableRow } from '@/lib/intake/readers/readable-file';

/**
 * The rows of a delimited text file in batches, the header row first. Blank lines at the end are dropped; elsewhere they
 * come as rows with one empty cell. Quotes follow RFC 4180; a quote that is never closed is refused.
 */
export async function* parseRows(
  source: ByteSource,
  delimiter: ',' | '\t',
): AsyncGenerator<TableRow[], void, undefined> {
  const parser = parse({
    delimiter,
    info: true,
    relax_column_count: true,
    skip_empty_lines: false,
    max_record_size: 64 * 1024 * 1024,
  });
  let failure: Error | null = null;
  parser.on('error', (error) => (failure = error));
  let line = 1;
  let blanks: TableRow[] = [];
  const drain = (): TableRow[] => {
    const batch: TableRow[] = [];
    for (let next = parser.read() as Parsed | null; next !== null; next = parser.read() as Parsed | null) {
      const row = { cells: next.record, line };
      line = next.info.lines + 1;
      if (row.cells.length === 1 && row.cells[0] === '') blanks.push(row);
      else {
        batch.push(...blanks, row);
        blanks = [];
      }
    }
    if (failure !== null) throw refusalOf(failure, line);
    return batch;
  };
  try {
    for await (const text of streamLines(source)) {
      const taken = write(parser, text);
      // The stream takes more only once its rows are read, so reading and waiting go on together.
      for (;;) {
        const batch = drain();
        if (batch.length > 0) yield batch;
        if (await settled(taken)) break;
      }
      const batch = drain();
      if (batch.length > 0) yield batch;
    }
    const ended = new Promise<void>((resolve) => {
      parser.once('end', resolve);
      parser.once('error', () => resolve());
    });
    parser.end();
    for (;;) {
      const batch = drain();
      if (batch.length > 0) yield batch;
      if (await settled(ended)) break;
    }
    const batch = drain();
    if (batch.length > 0) yield batch;
  } finally {
    parser.destroy();
  }
}

interface Parsed {
  info: Info;
  record: string[];
}

function write(parser: ReturnType<typeof parse>, text: string): Promise<void> {
  return new Promise((resolve) => {
    parser.write(text, () => resolve());
  });
}

/** Whether a promise has settled, after giving the event loop one turn. */
async function settled(promise: Promise<void>): Promise<boolean> {
  const turn = new Promise<false>((resolve) => setImmediate(() => resolve(false)));
  return Promise.race([promise.then(() => true), turn]);
}

function refusalOf(error: Error, line: number): IntakeRefusal {
  if (error instanceof CsvError && error.code === 'CSV_QUOTE_NOT_CLOSED')
    return new IntakeRefusal(
      'csv-quote',
      `A quotation mark in the row of line ${line} is never closed.`,
      'Close it, or double it if it belongs to the text.',
      { line },
    );
  const quote = error instanceof CsvError && /QUOTE/.test(error.code);
  return new IntakeRefusal(
    quote ? 'csv-quote' : 'csv-structure',
    quote
      ? `A quotation mark stands where none may, in the row of line ${line}.`
      : `The row of line ${line} cannot be read: ${error.message}.`,
    'Correct the row and send the file again.',
    { line },
  );
}
