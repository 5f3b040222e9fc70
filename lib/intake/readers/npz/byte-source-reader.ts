import { Readable } from 'node:stream';
import { RandomAccessReader } from 'yauzl';
import type { ByteSource } from '@/lib/intake/byte-source';
import { streamBytes } from '@/lib/intake/readers/stream-bytes';

/** A byte source in the form in which yauzl asks for ranges. */
export class ByteSourceReader extends RandomAccessReader {
  readonly #source: ByteSource;

  constructor(source: ByteSource) {
    super();
    this.#source = source;
  }

  override _readStreamForRange(start: number, end: number): Readable {
    return Readable.from(streamBytes(this.#source, start, Math.min(end, this.#source.sizeBytes)), {
      objectMode: false,
    });
  }
}
