import { columnRole } from '@/lib/intake/proposal/column-role';
import { isTable, type OfferedArray, type OfferedFile } from '@/lib/intake/proposal/offered-file';

/** How many values an array has that could be a column (n, n × 1 or 1 × n); null for anything else and for scalars. */
export function columnLength(array: { shape: number[] }): number | null {
  const long = array.shape.filter((length) => length !== 1);
  return array.shape.length >= 1 && array.shape.length <= 2 && long.length === 1 ? long[0] : null;
}

/** All arrays of all files, each with its file. */
export function arraysOf(files: readonly OfferedFile[]): OfferedArray[] {
  return files.flatMap(({ fileId, name, format, arrays }) =>
    arrays.map((array) => ({ ...array, fileId, fileName: name, format })),
  );
}

/**
 * The lengths that columns of trials and of units have, told by the columns' names. A text table's columns go together: if
 * one of them is a trial's, all are. A length that both kinds have is in both sets, and the axes stay open.
 */
export function rowLengths(files: readonly OfferedFile[]): Record<'trial' | 'unit' | 'bin', Set<number>> {
  const lengths = { trial: new Set<number>(), unit: new Set<number>(), bin: new Set<number>() };
  for (const file of files) {
    const ragged = new Set(
      file.arrays.flatMap(({ path }) =>
        path.endsWith('_index') ? [path, path.slice(0, -'_index'.length)] : [],
      ),
    );
    const columns = arraysOf([file]).flatMap((array) => {
      const length = ragged.has(array.path) ? null : columnLength(array);
      return length === null ? [] : [{ role: columnRole(array), length }];
    });
    if (isTable(file.format)) {
      const roles = new Set(columns.map((column) => column.role));
      if (isLongTable(file)) continue;
      // In a table of its own, a unit table is told by naming no trial column.
      const role = roles.has('trial') ? 'trial' : roles.has('unit') ? 'unit' : null;
      if (role !== null && columns.length > 0) lengths[role].add(columns[0].length);
      continue;
    }
    for (const { role, length } of columns) {
      if (role === null) continue;
      lengths[role].add(length);
      if (role === 'bin') lengths.bin.add(length - 1); // edges are one more than bins
    }
  }
  return lengths;
}

/** Whether a table is one of counts in the long form: it has a trial, a unit, a bin and a count column. */
export function isLongTable(file: OfferedFile): boolean {
  return longColumns(file) !== null;
}

/** The columns of a table of counts in the long form. */
export function longColumns(
  file: OfferedFile,
): { trial: string; unit: string; bin: string; count: string } | null {
  if (!isTable(file.format)) return null;
  const find = (pattern: RegExp): string | undefined =>
    file.arrays.find((array) => pattern.test(array.path))?.path;
  const trial = find(/^trial(?:[_ ]?(?:id|number))?$/i);
  const unit = find(/^(?:unit|cell|neuron)(?:[_ ]?(?:id|number))?$/i);
  const bin = find(/^(?:bin|time[_ ]?bin)$/i);
  const count = find(/^(?:count|counts|spikes|n[_ ]?spikes)$/i);
  return trial && unit && bin && count ? { trial, unit, bin, count } : null;
}
