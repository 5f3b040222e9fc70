import type { Column } from '@/lib/intake/column';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { CountsBuilder } from '@/lib/intake/mapping/counts-builder';
import { numberRows, rowKey } from '@/lib/intake/mapping/number-rows';
import { findWideColumns } from '@/lib/intake/readers/csv/find-wide-columns';
import { readNumber } from '@/lib/intake/readers/csv/read-number';
import type { ReadableTable } from '@/lib/intake/readers/readable-file';

/**
 * Counts from a table with one row a trial and one column a unit and bin. With a `trial` column that the trial table has
 * too, rows are matched by its values; otherwise they are in session order.
 */
export async function countsFromWide(
  table: ReadableTable,
  wide: { trial?: string; pattern: string; base?: 0 | 1 },
  trials: readonly Column[],
  fileName: string,
): Promise<CountsBuilder> {
  const file = fileName;
  const found = findWideColumns(table.header, wide.pattern, wide.base);
  if (!('columns' in found))
    throw new IntakeRefusal(
      found.code,
      found.message,
      'Name the columns like u0_b0, u0_b1 … without gaps, or correct the pattern.',
      { file, line: 1 },
    );
  const idAt = wide.trial === undefined ? -1 : table.header.indexOf(wide.trial);
  if (wide.trial !== undefined && idAt === -1)
    throw new IntakeRefusal(
      'column-not-found',
      `${file} has no column “${wide.trial}”.`,
      'Choose one of its columns.',
      { file, line: 1 },
    );
  const idColumn = trials.find((column) => column.name === wide.trial);
  const rowOf = idColumn === undefined ? null : numberRows(idColumn, 'trial', file);
  const { nUnits, nBins, columns } = found;
  const builder = new CountsBuilder([table.nRows, nUnits, nBins], { file });
  const seen = new Map<string, number>();
  let position = 0;
  for await (const batch of table.rows())
    for (const row of batch) {
      const { line } = row;
      let trial = position;
      if (idAt !== -1) {
        const key = rowKey(row.cells[idAt]);
        const place = { file, line, column: idAt + 1 };
        if (key === '')
          throw new IntakeRefusal(
            'trial-id-missing',
            `Line ${line} does not say which trial it is.`,
            `Fill in “${wide.trial}”.`,
            place,
          );
        const before = seen.get(key);
        if (before !== undefined)
          throw new IntakeRefusal(
            'trial-id-duplicate',
            `Lines ${before} and ${line} are both trial ${key}.`,
            'Keep one row a trial.',
            place,
          );
        seen.set(key, line);
        if (rowOf !== null) {
          const matched = rowOf.get(key);
          if (matched === undefined)
            throw new IntakeRefusal(
              'trial-unmatched',
              `Line ${line} is trial ${key}, which the trial table does not have.`,
              'Send the trial table that belongs to these counts.',
              place,
            );
          trial = matched;
        }
      }
      position += 1;
      if (trial >= table.nRows) continue; // more trials in the table than rows here: the lengths are compared later
      const base = trial * nUnits * nBins;
      for (let cell = 0; cell < columns.length; cell++) {
        const text = row.cells[columns[cell]];
        const value = readNumber(text);
        if (value === null) throw notACount(text, file, line, columns[cell]);
        builder.set(base + cell, value, value >= 0 ? undefined : { line, column: columns[cell] + 1 });
      }
    }
  if (rowOf !== null && rowOf.size !== table.nRows)
    throw new IntakeRefusal(
      'trials-disagree',
      `The counts have ${table.nRows} rows, the trial table ${rowOf.size} trials.`,
      'Send counts and trial table of the same trials.',
      { file },
    );
  return builder;
}

function notACount(text: string, file: string, line: number, at: number): IntakeRefusal {
  const blank = text.trim() === '';
  return new IntakeRefusal(
    blank ? 'count-blank' : 'count-not-numeric',
    blank
      ? `Line ${line}, column ${at + 1} is blank where a count is expected.`
      : `Line ${line}, column ${at + 1} reads “${text.slice(0, 40)}” where a count is expected.`,
    blank ? 'Blank is not 0: write 0 if there was no spike.' : 'Write whole numbers from 0.',
    { file, line, column: at + 1 },
  );
}
