import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { findFile } from '@/lib/intake/mapping/find-file';
import type { SourceFiles } from '@/lib/intake/mapping/source-files';
import type { ReadableArray } from '@/lib/intake/readers/readable-file';

const FOLDERS = { trial: '/intervals/trials/', unit: '/units/' } as const;

/**
 * The array by that path in that file, or a refusal that names both. A leading slash may be left out; a column of a
 * trial or unit table (`table`) may be named without the folder in which NWB keeps that table.
 */
export function findArray(
  files: SourceFiles,
  fileId: string,
  path: string,
  role: string,
  table?: 'trial' | 'unit',
): { array: ReadableArray; name: string } {
  const { file, name } = findFile(files, fileId, role);
  const paths = [path, `/${path}`, ...(table === undefined ? [] : [`${FOLDERS[table]}${path}`])];
  const array = paths
    .map((wanted) => file.arrays.find((one) => one.path === wanted))
    .find((one) => one !== undefined);
  if (array === undefined)
    throw new IntakeRefusal(
      'array-not-found',
      `${name} has no array “${path}”, from which the mapping takes ${role}.`,
      `It has: ${
        file.arrays
          .slice(0, 12)
          .map((one) => one.path || '(one array without a name)')
          .join(', ') || 'none'
      }.`,
      { file: name, path },
    );
  return { array, name };
}
