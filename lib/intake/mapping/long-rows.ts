import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { rowKey } from '@/lib/intake/mapping/number-rows';
import { readNumber } from '@/lib/intake/readers/csv/read-number';
import type { ReadableTable } from '@/lib/intake/readers/readable-file';

const MAX_ROWS = 12_000_000;

/** The rows of a table of counts in the long form, as numbers: columns trial, unit, bin and count. */
export class LongRows {
  /** trial, unit, bin, count; identifiers that are no numbers are kept apart as keys. */
  readonly values: readonly [Float64Array, Float64Array, Float64Array, Float64Array];
  readonly lines: Int32Array;
  readonly #keys: readonly (string[] | null)[];
  readonly #file: string;

  private constructor(
    values: LongRows['values'],
    lines: Int32Array,
    keys: readonly (string[] | null)[],
    file: string,
  ) {
    this.values = values;
    this.lines = lines;
    this.#keys = keys;
    this.#file = file;
  }

  get nRows(): number {
    return this.lines.length;
  }

  static async read(
    table: ReadableTable,
    names: { trial: string; unit: string; bin: string; count: string },
    file: string,
  ): Promise<LongRows> {
    if (table.nRows > MAX_ROWS)
      throw new IntakeRefusal(
        'long-rows',
        `The table has ${table.nRows} rows; at most ${MAX_ROWS} are read in the long form.`,
        'Send the counts as an array (NPY or NPZ).',
        { file },
      );
    const wanted = [names.trial, names.unit, names.bin, names.count];
    const at = wanted.map((name) => {
      const column = table.header.indexOf(name);
      if (column === -1)
        throw new IntakeRefusal(
          'column-not-found',
          `${file} has no column “${name}”.`,
          `It has: ${table.header.slice(0, 12).join(', ')}.`,
          { file, line: 1 },
        );
      return column;
    });
    const column = (): Float64Array => new Float64Array(table.nRows);
    const values: LongRows['values'] = [column(), column(), column(), column()];
    const lines = new Int32Array(table.nRows);
    const keys: (string[] | null)[] = [null, null, null];
    let row = 0;
    for await (const batch of table.rows())
      for (const { cells, line } of batch) {
        lines[row] = line;
        for (let axis = 0; axis < 4; axis++) {
          const text = cells[at[axis]];
          const value = readNumber(text);
          if (text.trim() === '')
            throw new IntakeRefusal(
              axis === 3 ? 'count-blank' : 'long-blank',
              `Line ${line}, column ${at[axis] + 1} is blank.`,
              'Blank is not 0: fill the cell in, or remove the row.',
              { file, line, column: at[axis] + 1 },
            );
          if (axis < 2 && (value === null || Number.isNaN(value))) {
            const list = (keys[axis] ??= []);
            list[row] = rowKey(text);
          } else if (value === null)
            throw new IntakeRefusal(
              axis === 3 ? 'count-not-numeric' : 'long-not-numeric',
              `Line ${line}, column ${at[axis] + 1} reads “${text.slice(0, 40)}” where a number is expected.`,
              'Write whole numbers from 0.',
              { file, line, column: at[axis] + 1 },
            );
          values[axis][row] = value ?? NaN;
        }
        row += 1;
      }
    return new LongRows(values, lines, keys, file);
  }

  largest(axis: number): number {
    return this.values[axis].reduce((high, value) => (value > high ? value : high), 0);
  }

  /** Whether numbers of an axis start at 0 or 1; asked of the member where the table leaves it open. */
  tellBase(axis: number, name: string, length: number | undefined): 0 | 1 {
    const lowest = this.values[axis].reduce((low, value) => (value < low ? value : low), Infinity);
    if (lowest < 1 || Number.isNaN(lowest) || lowest === Infinity) return 0;
    if (length !== undefined && this.largest(axis) >= length) return 1;
    throw new IntakeRefusal(
      'long-base',
      `The smallest ${name} number is ${lowest}: the table does not tell whether ${name}s are numbered from 0 or from 1.`,
      'Say “base”: 0 or 1 in the mapping.',
      { file: this.#file },
    );
  }

  /** Each row's index when the axis is numbered from `base`. */
  number(axis: number, base: 0 | 1, name: string, column: string): Int32Array {
    const index = new Int32Array(this.nRows);
    for (let row = 0; row < index.length; row++) {
      const value = this.values[axis][row] - base;
      if (!Number.isInteger(value) || value < 0 || value > 2_147_483_646)
        throw new IntakeRefusal(
          'long-index',
          `Line ${this.lines[row]} gives ${name} ${this.#text(axis, row)}, which is not a whole number from ${base}.`,
          `Number ${name}s from ${base}, or send a table with a column “${column}” that names them.`,
          { file: this.#file, line: this.lines[row] },
        );
      index[row] = value;
    }
    return index;
  }

  /** Each row's index by an identifying column. */
  match(axis: number, rows: ReadonlyMap<string, number>, name: string, column: string): Int32Array {
    const index = new Int32Array(this.nRows);
    for (let row = 0; row < index.length; row++) {
      const key = this.#text(axis, row);
      const found = rows.get(key);
      if (found === undefined)
        throw new IntakeRefusal(
          `${name}-unmatched`,
          `Line ${this.lines[row]} names ${name} ${key}, which the ${name} table's “${column}” does not have.`,
          `Send the ${name} table that belongs to these counts.`,
          { file: this.#file, line: this.lines[row] },
        );
      index[row] = found;
    }
    return index;
  }

  #text(axis: number, row: number): string {
    return this.#keys[axis]?.[row] ?? String(this.values[axis][row]);
  }
}
