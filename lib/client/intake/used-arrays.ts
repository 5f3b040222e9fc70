import { arrayKey } from '@/lib/client/intake/array-key';
import type { ArrayUse } from '@/lib/client/intake/array-use';
import { columnName } from '@/lib/client/intake/column-name';
import type { IntakeDraft } from '@/lib/client/intake/intake-draft';
import type { ArrayFact, StoredFile } from '@/lib/contracts/file';

/** An array that the draft uses, with its file and the name of its column. */
export interface UsedArray {
  file: StoredFile;
  array: ArrayFact;
  use: ArrayUse;
  name: string;
}

/** The arrays that a draft uses, in the files' order. */
export function usedArrays(draft: IntakeDraft, files: readonly StoredFile[]): UsedArray[] {
  return files.flatMap((file) =>
    file.arrays.flatMap((array) => {
      const key = arrayKey(file.id, array.path);
      const use = draft.uses[key];
      if (use === undefined || use.kind === 'unused') return [];
      return [{ file, array, use, name: draft.names[key] ?? columnName(array.path, file.name) }];
    }),
  );
}
