import type { Column } from '@/lib/intake/column';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { ColumnWish } from '@/lib/intake/mapping/column-wish';
import { makeColumn } from '@/lib/intake/mapping/make-column';
import type { ReadableArray } from '@/lib/intake/readers/readable-file';

/** Reads a whole array of one axis as a column of the wished type. */
export async function toColumn(array: ReadableArray, wish: ColumnWish, fileName: string): Promise<Column> {
  const place = { file: fileName, path: array.path };
  if (wish.type === 'category') {
    const names: (string | null)[] = [];
    for await (const chunk of array.chunks())
      for (const value of chunk) names.push(isMissing(value) ? null : String(value));
    return makeColumn(wish, names);
  }
  if (array.dtype === 'string')
    throw new IntakeRefusal(
      'not-a-number',
      `“${wish.name}” holds text and is to be read as numbers.`,
      'Make it a category, or choose another array.',
      place,
    );
  const values = new Float64Array(array.shape.reduce((product, length) => product * length, 1));
  let at = 0;
  for await (const chunk of array.chunks()) for (const value of chunk) values[at++] = Number(value);
  return makeColumn(wish, values);
}

function isMissing(value: number | bigint | string): boolean {
  return value === '' || (typeof value === 'number' && Number.isNaN(value));
}
