import type { ArrayFact, FileFormat } from '@/lib/contracts/file';
import type { Problem } from '@/lib/contracts/problem';
import type { ByteSource } from '@/lib/intake/byte-source';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { openFile } from '@/lib/intake/readers/open-file';
import type { ReadableArray } from '@/lib/intake/readers/readable-file';

const SAMPLE_VALUES = 6;
const MAX_ARRAYS = 5_000;

/** What a file turned out to be: its format and arrays with their first values, or why it is refused. */
export interface Inspection {
  state: 'readable' | 'refused';
  format: FileFormat | null;
  arrays: ArrayFact[];
  problems: Problem[];
}

/**
 * Recognises a file, lists its arrays with a few values each, and reads every array through once, so that damage inside
 * (a wrong checksum, a stream that ends early) is told at once and not when the session is made.
 */
export async function inspectFile(source: ByteSource, name: string): Promise<Inspection> {
  let format: FileFormat | null = null;
  try {
    const file = await openFile(source);
    format = file.format;
    try {
      if (file.arrays.length > MAX_ARRAYS)
        throw new IntakeRefusal(
          'arrays-too-many',
          `The file holds ${file.arrays.length} arrays; at most ${MAX_ARRAYS} are listed.`,
          'Send only the arrays that belong to the session.',
        );
      const arrays: ArrayFact[] = [];
      // A table was read through when it was opened; other formats are read here.
      for (const array of file.arrays) {
        const { path, dtype, shape } = array;
        arrays.push({ path, dtype, shape, sample: await sampleOf(array, file.table === undefined) });
      }
      const problems = file.problems.map((problem) => ({
        ...problem,
        place: { file: name, ...problem.place },
      }));
      return { state: 'readable', format: file.format, arrays, problems };
    } finally {
      file.close();
    }
  } catch (error) {
    if (!(error instanceof IntakeRefusal)) throw error;
    return { state: 'refused', format, arrays: [], problems: [error.toProblem({ file: name })] };
  }
}

async function sampleOf(array: ReadableArray, readsAll: boolean): Promise<string[]> {
  const sample: string[] = [];
  for await (const chunk of array.chunks()) {
    for (let at = 0; at < chunk.length && sample.length < SAMPLE_VALUES; at++)
      sample.push(String(chunk[at]).slice(0, 40));
    if (!readsAll && sample.length >= SAMPLE_VALUES) break;
  }
  return sample;
}
