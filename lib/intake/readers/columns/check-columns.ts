import type { FileFormat } from '@/lib/contracts/file';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';

const MAX_VALUES = 24_000_000;
const MAX_COLUMNS = 20_000;

/** Refuses tables that are too large to hold, and columns that share a name. */
export function checkColumns(format: FileFormat, names: readonly string[], nRows: number): void {
  if (names.length === 0 || nRows === 0)
    throw new IntakeRefusal(`${format}-empty`, 'The file holds no rows.', 'Check the export.');
  if (names.length > MAX_COLUMNS || names.length * nRows > MAX_VALUES)
    throw new IntakeRefusal(
      `${format}-too-large`,
      `The file holds ${nRows} rows of ${names.length} columns; at most ${MAX_VALUES} values are read from such a file.`,
      'Send the counts as an array (NPY, NPZ or HDF5).',
    );
  const twice = names.find((name, at) => names.indexOf(name) !== at);
  if (twice !== undefined)
    throw new IntakeRefusal(
      `${format}-duplicate-name`,
      `Two columns are named “${twice}”.`,
      'Give each column a name of its own.',
      { path: twice },
    );
}
