import { db } from '@/db/connection';
import { findSessionFiles } from '@/db/repositories/files';
import type { RecipeInput } from '@/lib/contracts/recipe';
import { lostProblem } from '@/lib/services/intake/lost-problem';
import { ReaderLost } from '@/lib/services/intake/reader-lost';
import { readerSeconds } from '@/lib/services/intake/reader-seconds';
import { runReader } from '@/lib/services/intake/run-reader';
import {
  permutationMatrix,
  permutationRows,
  type Permutations,
} from '@/lib/services/readouts/readout-inputs';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import { objectStore } from '@/storage/object-store';

/** The most entries (draws × trials) that are taken from a file: 128 MiB. */
const maxEntries = 32 * 1024 * 1024;

export interface FoundPermutations {
  /** undefined where the recipe gives none. */
  rows: readonly ArrayLike<number>[] | undefined;
  matrix: Permutations | null;
  faults: RecipeFault[];
}

/** The permutations that a recipe gives, inline or by an array in one of the session's files. */
export async function findPermutations(
  labId: string,
  sessionId: string,
  scheme: RecipeInput['null'],
): Promise<FoundPermutations> {
  const given = scheme?.permutations;
  if (given === undefined) return { rows: undefined, matrix: null, faults: [] };
  if (Array.isArray(given)) return { rows: given, matrix: permutationMatrix(given), faults: [] };
  const pointer = '/recipe/null/permutations';
  const refuse = (code: string, message: string, at = pointer): FoundPermutations => ({
    rows: undefined,
    matrix: null,
    faults: [{ pointer: at, code, message }],
  });
  const [file] = await findSessionFiles(db(), labId, sessionId, [given.fileId]);
  if (!file) return refuse('file-not-found', 'This session has no such file.', `${pointer}/fileId`);
  if (file.state !== 'readable')
    return refuse('file-not-readable', `The file ${file.name} is ${file.state}.`, `${pointer}/fileId`);
  try {
    const { matrix, problems } = await runReader(
      {
        kind: 'matrix',
        file: { fileId: file.id, name: file.name, sizeBytes: file.size_bytes },
        path: given.path,
        maxEntries,
      },
      'matrix',
      {
        read: (_fileId, offset, length) => objectStore().getRange(file.object_key, offset, length),
        maxSeconds: readerSeconds(file.size_bytes),
        maxBytes: 1024 * 1024 * 1024,
      },
    );
    if (!matrix) return refuse(problems[0].code, problems[0].message, `${pointer}/path`);
    return { rows: permutationRows(matrix), matrix, faults: [] };
  } catch (error) {
    if (!(error instanceof ReaderLost)) throw error;
    const { code, message } = lostProblem(error);
    return refuse(code, message, `${pointer}/fileId`);
  }
}
