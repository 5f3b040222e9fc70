import type { ReadableFile } from '@/lib/intake/readers/readable-file';

/** A member's file, opened, with the name it was sent by (only ever shown, never used as a path). */
export interface SourceFile {
  name: string;
  file: ReadableFile;
}

/** The files that a mapping may refer to, by id. */
export type SourceFiles = ReadonlyMap<string, SourceFile>;
