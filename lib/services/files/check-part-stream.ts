import { createHash } from 'node:crypto';
import { Transform, type TransformCallback } from 'node:stream';
import { AppError } from '@/lib/errors/app-error';

/** Passes a part's bytes on, counts and hashes them, and fails where there are more or fewer than expected. */
export class CheckPartStream extends Transform {
  readonly #hash = createHash('sha256');
  readonly #expectedBytes: number;
  #bytes = 0;
  #sha256: string | null = null;

  constructor(expectedBytes: number) {
    super();
    this.#expectedBytes = expectedBytes;
  }

  /** Only once the stream has ended. */
  get sha256(): string {
    if (this.#sha256 === null) throw new Error('the part has not been read to its end');
    return this.#sha256;
  }

  override _transform(chunk: Buffer, _encoding: BufferEncoding, done: TransformCallback): void {
    this.#bytes += chunk.length;
    if (this.#bytes > this.#expectedBytes) return done(wrongSize(this.#expectedBytes, 'more'));
    this.#hash.update(chunk);
    done(null, chunk);
  }

  override _flush(done: TransformCallback): void {
    if (this.#bytes < this.#expectedBytes) return done(wrongSize(this.#expectedBytes, `${this.#bytes}`));
    this.#sha256 = this.#hash.digest('hex');
    done();
  }
}

function wrongSize(expected: number, came: string): AppError {
  return new AppError('invalid-input', `This part must be ${expected} bytes long; ${came} came.`, {
    faults: [{ pointer: '', code: 'part-size', detail: `expected ${expected} bytes` }],
  });
}
