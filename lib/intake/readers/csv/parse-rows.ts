import { CsvError, parse, type Info, type Parser } from 'csv-parse';
import type { ByteSource } from '@/lib/intake/byte-source';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { streamLines } from '@/lib/intake/readers/csv/stream-lines';
import type { TableRow } from '@/lib/intake/readers/readable-file';

/**
 * The rows of a delimited text file in batches, the header row first. Blank lines at the end are dropped; elsewhere they
 * come as rows with one empty cell. Quotes follow RFC 4180; a quote that is never closed is refused.
 *
 * Text without a quotation mark is split plainly, several times faster than the parser; from the first block that has one
 * (or a carriage return that ends a line alone) everything goes through the parser.
 */
export async function* parseRows(
  source: ByteSource,
  delimiter: ',' | '\t',
): AsyncGenerator<TableRow[], void, undefined> {
  let line = 1;
  let blanks: TableRow[] = [];
  const withoutEnd = (rows: TableRow[]): TableRow[] => {
    const batch: TableRow[] = [];
    for (const row of rows)
      if (row.cells.length === 1 && row.cells[0] === '') blanks.push(row);
      else {
        batch.push(...blanks, row);
        blanks = [];
      }
    return batch;
  };
  let quoted: QuotedRows | null = null;
  try {
    for await (const text of streamLines(source)) {
      if (quoted === null && !/"|\r(?!\n)/.test(text)) {
        const lines = text.split('\n');
        if (lines.at(-1) === '') lines.pop();
        const rows = lines.map((one) => ({
          cells: (one.endsWith('\r') ? one.slice(0, -1) : one).split(delimiter),
          line: line++,
        }));
        yield withoutEnd(rows);
        continue;
      }
      quoted ??= new QuotedRows(delimiter, line);
      for await (const rows of quoted.take(text)) yield withoutEnd(rows);
    }
    if (quoted !== null) for await (const rows of quoted.end()) yield withoutEnd(rows);
  } finally {
    quoted?.close();
  }
}

/** Rows through the parser, which understands quotes. */
class QuotedRows {
  readonly #parser: Parser;
  readonly #firstLine: number;
  #line: number;
  #failure: Error | null = null;

  constructor(delimiter: ',' | '\t', firstLine: number) {
    this.#line = firstLine;
    this.#firstLine = firstLine;
    this.#parser = parse({
      delimiter,
      info: true,
      relax_column_count: true,
      skip_empty_lines: false,
      max_record_size: 64 * 1024 * 1024,
    });
    this.#parser.on('error', (error) => (this.#failure = error));
  }

  async *take(text: string): AsyncGenerator<TableRow[], void, undefined> {
    yield* this.#until(new Promise<void>((resolve) => this.#parser.write(text, () => resolve())));
  }

  async *end(): AsyncGenerator<TableRow[], void, undefined> {
    const ended = new Promise<void>((resolve) => {
      this.#parser.once('end', resolve);
      this.#parser.once('error', () => resolve());
    });
    this.#parser.end();
    yield* this.#until(ended);
  }

  close(): void {
    this.#parser.destroy();
  }

  /** The stream takes more only once its rows are read, so reading and waiting go on together. */
  async *#until(settling: Promise<void>): AsyncGenerator<TableRow[], void, undefined> {
    for (let isSettled = false; !isSettled;) {
      isSettled = await settled(settling);
      const rows = this.#drain();
      if (rows.length > 0) yield rows;
    }
  }

  #drain(): TableRow[] {
    const rows: TableRow[] = [];
    for (let next = this.#next(); next !== null; next = this.#next()) {
      rows.push({ cells: next.record, line: this.#line });
      this.#line = this.#firstLine + next.info.lines;
    }
    if (this.#failure !== null) throw refusalOf(this.#failure, this.#line);
    return rows;
  }

  #next(): Parsed | null {
    return this.#parser.read() as Parsed | null;
  }
}

interface Parsed {
  info: Info;
  record: string[];
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
