import { readFileSync } from 'node:fs';
import { memorySource } from '@/lib/intake/memory-source';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { openFile } from '@/lib/intake/readers/open-file';
import type { ReadableArray } from '@/lib/intake/readers/readable-file';

export const fixture = (path: string): Uint8Array =>
  new Uint8Array(readFileSync(new URL(`../../fixtures/${path}`, import.meta.url)));

/** All values of an array in stored order, numbers as bigint where the type is 64 bits wide. */
export async function allValues(array: ReadableArray): Promise<(number | bigint | string)[]> {
  const values: (number | bigint | string)[] = [];
  for await (const chunk of array.chunks()) for (const value of chunk) values.push(value);
  return values;
}

/** Opens bytes and reads every array to its end; gives the refusal if there is one. */
export async function refusalOf(bytes: Uint8Array): Promise<IntakeRefusal | null> {
  try {
    const file = await openFile(memorySource(bytes));
    try {
      for (const array of file.arrays) for await (const chunk of array.chunks()) void chunk.length;
    } finally {
      file.close();
    }
    return null;
  } catch (error) {
    if (error instanceof IntakeRefusal) return error;
    throw error;
  }
}
