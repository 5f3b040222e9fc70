import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { findFile } from '@/lib/intake/mapping/find-file';
import type { SourceFiles } from '@/lib/intake/mapping/source-files';
import type { ReadableArray } from '@/lib/intake/readers/readable-file';

/** The array by that path in that file, or a refusal that names both. */
export function findArray(
  files: SourceFiles,
  fileId: string,
  path: string,
  role: string,
): { array: ReadableArray; name: string } {
  const { file, name } = findFile(files, fileId, role);
  const array = file.arrays.find((one) => one.path === path);
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
