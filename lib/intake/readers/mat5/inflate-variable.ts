import { Readable } from 'node:stream';
import { createInflate } from 'node:zlib';
import type { ByteSource } from '@/lib/intake/byte-source';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { streamBytes } from '@/lib/intake/readers/stream-bytes';

const BOMB_MIN_BYTES = 64 * 1024 * 1024;
const BOMB_RATIO = 200;

/** One top-level element of a file: where its bytes are, and whether they are deflated. */
export interface TopElement {
  offset: number;
  nBytes: number;
  isCompressed: boolean;
}

/** The bytes of a top-level element, inflated if need be, beginning with the array's tag. */
export async function* inflateVariable(
  source: ByteSource,
  element: TopElement,
  variable: string,
): AsyncGenerator<Uint8Array, void, undefined> {
  const packed = streamBytes(source, element.offset, element.offset + element.nBytes);
  if (!element.isCompressed) return yield* packed;
  const inflate = createInflate();
  const input = Readable.from(packed, { objectMode: false });
  input.on('error', (error) => inflate.destroy(error));
  let total = 0;
  try {
    for await (const slab of input.pipe(inflate) as AsyncIterable<Buffer>) {
      total += slab.length;
      if (total > BOMB_MIN_BYTES && total > BOMB_RATIO * element.nBytes)
        throw new IntakeRefusal(
          'mat5-bomb',
          `The file grows more than ${BOMB_RATIO}-fold in ${variable}, more than recorded data ever do.`,
          'If the array is real, save it without compression.',
        );
      yield slab;
    }
  } catch (error) {
    const { code } = error as { code?: unknown };
    if (typeof code === 'string' && (code.startsWith('Z_') || code === 'ERR_STREAM_PREMATURE_CLOSE'))
      throw new IntakeRefusal(
        'mat5-inflate',
        `The file is damaged in ${variable}: it cannot be unpacked.`,
        'The file was damaged on its way: copy or save it again.',
      );
    throw error;
  } finally {
    input.destroy();
    inflate.destroy();
  }
}
