import type { TableSource } from '@/lib/contracts/intake';
import type { Column } from '@/lib/intake/column';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { findFile } from '@/lib/intake/mapping/find-file';
import { findArray } from '@/lib/intake/mapping/find-array';
import type { ColumnWish } from '@/lib/intake/mapping/column-wish';
import { readTextColumns } from '@/lib/intake/mapping/read-text-columns';
import { toColumn } from '@/lib/intake/mapping/to-column';
import type { SourceFiles } from '@/lib/intake/mapping/source-files';
import type { ReadableArray, ReadableFile } from '@/lib/intake/readers/readable-file';

const MAX_ROWS = 5_000_000;

/**
 * The columns of a trial or unit table: those that the mapping names, or all of a text table's own. All have one length.
 */
export async function readTable(
  files: SourceFiles,
  source: TableSource,
  role: 'trial' | 'unit',
): Promise<Column[]> {
  const { file, name } = findFile(files, source.fileId, `the ${role} table`);
  const wishes = source.columns === undefined ? ownColumns() : Object.entries(source.columns).map(toWish);
  if (wishes.length === 0)
    throw new IntakeRefusal(
      'table-empty',
      `The ${role} table has no columns.`,
      `Name at least one column of the ${role} table.`,
      { file: name },
    );
  const arrays = wishes.map(
    (wish) => findArray(files, source.fileId, wish.path, `the ${role} column “${wish.name}”`, role).array,
  );
  const lengths = arrays.map((array, at) => columnLength(array, wishes[at].name, name));
  lengths.forEach((length, at) => {
    if (length !== lengths[0])
      throw new IntakeRefusal(
        'columns-disagree',
        `The ${role} column “${wishes[at].name}” has ${length} values, “${wishes[0].name}” has ${lengths[0]}.`,
        `Every ${role} column needs one value a ${role}.`,
        { file: name, path: wishes[at].path },
      );
  });
  if (file.table !== undefined) return readTextColumns(file.table, wishes, name);
  const columns: Column[] = [];
  for (const [at, wish] of wishes.entries()) columns.push(await toColumn(arrays[at], wish, name));
  return columns;

  function ownColumns(): ColumnWish[] {
    const inFolder = nwbColumns(file, role);
    if (inFolder.length > 0) return inFolder;
    if (file.table === undefined)
      throw new IntakeRefusal(
        'columns-unnamed',
        `${name} is a set of arrays, so the mapping must say which of them are columns of the ${role} table.`,
        'Name the columns.',
        { file: name },
      );
    return file.arrays
      .filter((array) => array.shape.length === 1)
      .map((array) => ({
        name: array.path,
        path: array.path,
        type: array.dtype === 'string' ? ('category' as const) : ('number' as const),
      }));
  }
}

/** The plain columns of an NWB table: those with one value a row, without the lists of unequal length and their indices. */
function nwbColumns(file: ReadableFile, role: 'trial' | 'unit'): ColumnWish[] {
  if (file.format !== 'nwb') return [];
  const folder = role === 'trial' ? '/intervals/trials/' : '/units/';
  const own = file.arrays.filter(
    (array) => array.path.startsWith(folder) && !array.path.slice(folder.length).includes('/'),
  );
  const ragged = new Set(
    own.filter((array) => array.path.endsWith('_index')).map((array) => array.path.slice(0, -6)),
  );
  return own
    .filter((array) => array.shape.length === 1 && !ragged.has(array.path) && !array.path.endsWith('_index'))
    .map((array) => ({
      name: array.path.slice(folder.length),
      path: array.path,
      type: array.dtype === 'string' ? ('category' as const) : ('number' as const),
    }));
}

function toWish([name, source]: [string, NonNullable<TableSource['columns']>[string]]): ColumnWish {
  return typeof source === 'string' ? { name, path: source, type: 'number' } : { name, ...source };
}

/** Columns may come as n, n × 1 or 1 × n. */
function columnLength(array: ReadableArray, column: string, file: string): number {
  const long = array.shape.filter((length) => length !== 1);
  const place = { file, path: array.path };
  if (long.length > 1 || array.shape.length > 2)
    throw new IntakeRefusal(
      'column-shape',
      `“${column}” is ${array.shape.join(' × ')}; a column has one value a row.`,
      'Choose an array with one axis.',
      place,
    );
  const length = array.shape.reduce((product, one) => product * one, 1);
  if (length > MAX_ROWS)
    throw new IntakeRefusal(
      'column-length',
      `“${column}” has ${length} values; at most ${MAX_ROWS} are taken.`,
      'Choose another array.',
      place,
    );
  return length;
}
