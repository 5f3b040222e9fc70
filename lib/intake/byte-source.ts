/**
 * Random access to the bytes of one stored file, so that a reader never holds a whole file.
 * `read` gives exactly `length` bytes from `offset`; a range that leaves the file is a programming error and throws.
 */
export interface ByteSource {
  readonly sizeBytes: number;
  read(offset: number, length: number): Promise<Uint8Array>;
  /** The same at once, for libraries that cannot wait. Not every source has it. */
  readSync?(offset: number, length: number): Uint8Array;
}
