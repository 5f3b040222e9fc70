import { crc32 } from 'node:zlib';
import type { Readable } from 'node:stream';
import type { Entry, ZipFile } from 'yauzl';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';

/**
 * The bytes of one member from `skipBytes` on. The stream never gives more than the directory's size; read to its end,
 * the size and the CRC-32 must agree.
 */
export async function* inflateEntry(
  zip: ZipFile,
  entry: Entry,
  skipBytes: number,
  path: string,
): AsyncGenerator<Uint8Array, void, undefined> {
  const damaged = (code: string, message: string): IntakeRefusal =>
    new IntakeRefusal(code, message, 'The archive was damaged on its way: copy or write it again.', { path });
  let stream: Readable;
  try {
    stream = await zip.openReadStreamPromise(entry);
  } catch (error) {
    throw damaged('zip-structure', `The member “${path}” cannot be opened: ${(error as Error).message}.`);
  }
  let seen = 0;
  let checksum = 0;
  try {
    for await (const slab of stream as AsyncIterable<Buffer>) {
      checksum = crc32(slab, checksum);
      const from = Math.max(0, skipBytes - seen);
      seen += slab.length;
      if (seen > entry.uncompressedSize)
        throw damaged('zip-size', `The member “${path}” is longer than the archive's directory says.`);
      if (from < slab.length) yield from === 0 ? slab : slab.subarray(from);
    }
  } catch (error) {
    if (error instanceof IntakeRefusal) throw error;
    const message = (error as Error).message;
    throw /too (many|few) bytes|not enough bytes/i.test(message)
      ? damaged('zip-size', `The member “${path}” does not have the size that the archive's directory says.`)
      : damaged('zip-inflate', `The member “${path}” cannot be unpacked: ${message}.`);
  } finally {
    stream.destroy();
  }
  if (seen !== entry.uncompressedSize)
    throw damaged(
      'zip-size',
      `The member “${path}” does not have the size that the archive's directory says.`,
    );
  if (checksum >>> 0 !== entry.crc32 >>> 0)
    throw damaged('zip-crc', `The member “${path}” fails its CRC-32 check.`);
}
