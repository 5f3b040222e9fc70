import type { Column } from '@/lib/intake/column';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { ColumnWish } from '@/lib/intake/mapping/column-wish';
import { makeColumn } from '@/lib/intake/mapping/make-column';
import { readNumber } from '@/lib/intake/readers/csv/read-number';
import type { ReadableTable } from '@/lib/intake/readers/readable-file';

/** Columns of a text table in one pass. A blank cell is missing; any other text in a number column is refused with its place. */
export async function readTextColumns(
  table: ReadableTable,
  wishes: readonly ColumnWish[],
  fileName: string,
): Promise<Column[]> {
  const indexOf = new Map(table.header.map((name, at) => [name, at]));
  const targets = wishes.map((wish) => {
    const at = indexOf.get(wish.path);
    if (at === undefined)
      throw new IntakeRefusal(
        'column-not-found',
        `${fileName} has no column “${wish.path}”.`,
        `It has: ${table.header.slice(0, 12).join(', ')}.`,
        { file: fileName, line: 1 },
      );
    return wish.type === 'category'
      ? { at, wish, names: new Array<string | null>(table.nRows) }
      : { at, wish, numbers: new Float64Array(table.nRows) };
  });
  let row = 0;
  for await (const batch of table.rows())
    for (const { cells, line } of batch) {
      for (const target of targets) {
        const text = cells[target.at].trim();
        if (target.names) target.names[row] = text === '' ? null : text;
        else {
          const value = text === '' ? NaN : readNumber(text);
          if (value === null) throw notANumber(target.wish.name, text, fileName, line, target.at);
          target.numbers[row] = value;
        }
      }
      row += 1;
    }
  return targets.map((target) => makeColumn(target.wish, target.names ?? target.numbers));
}

function notANumber(name: string, text: string, file: string, line: number, at: number): IntakeRefusal {
  const comma = /^[+-]?\d+,\d+$/.test(text);
  return new IntakeRefusal(
    comma ? 'decimal-comma' : 'not-a-number',
    `Line ${line}, column ${at + 1} (“${name}”) reads “${text.slice(0, 40)}”, which is not a number${comma ? ' with a decimal point' : ''}.`,
    comma ? 'Write decimal points.' : 'Correct the cell, or make the column a category.',
    { file, line, column: at + 1 },
  );
}
