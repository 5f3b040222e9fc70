import { decompressLz4Raw } from 'hyparquet-compressors';

const MAX_BYTES = 256 * 1024 * 1024;

/**
 * Unpacks an LZ4 frame whose blocks are independent, as Arrow writes them. Checksums are passed over: the file's own hash
 * has been checked. Source: the published LZ4 frame format, version 1.6.
 */
export function inflateLz4Frame(frame: Uint8Array): Uint8Array {
  const view = new DataView(frame.buffer, frame.byteOffset, frame.byteLength);
  if (view.getUint32(0, true) !== 0x184d2204) throw new Error('not an LZ4 frame');
  const flags = frame[4];
  const blockBytes = 1 << (8 + 2 * ((frame[5] >> 4) & 7));
  const [hasBlockSums, hasSize] = [(flags & 0x10) !== 0, (flags & 0x08) !== 0];
  if ((flags & 0xc0) !== 0x40 || (flags & 0x20) === 0) throw new Error('this kind of LZ4 frame is not read');
  let at = 6 + (hasSize ? 8 : 0) + ((flags & 1) !== 0 ? 4 : 0) + 1;
  const blocks: Uint8Array[] = [];
  let total = 0;
  for (let word = view.getUint32(at, true); word !== 0; word = view.getUint32(at, true)) {
    const size = word & 0x7fffffff;
    const block = frame.subarray(at + 4, at + 4 + size);
    if (block.length !== size) throw new Error('an LZ4 block is cut short');
    const plain = word >>> 31 === 1 ? block : inflateBlock(block, blockBytes);
    blocks.push(plain);
    total += plain.length;
    if (total > MAX_BYTES) throw new Error('an LZ4 frame grows beyond 256 MiB');
    at += 4 + size + (hasBlockSums ? 4 : 0);
  }
  return Uint8Array.from(Buffer.concat(blocks));
}

/** A block does not say how long it becomes; its tokens do. */
function inflateBlock(block: Uint8Array, maxBytes: number): Uint8Array {
  let length = 0;
  for (let at = 0; at < block.length;) {
    const token = block[at++];
    const run = (nibble: number): number => {
      let n = nibble;
      if (nibble === 15)
        for (let more = 255; more === 255; n += more) {
          if (at >= block.length) throw new Error('an LZ4 block is cut short');
          more = block[at++];
        }
      return n;
    };
    const literals = run(token >> 4);
    length += literals;
    at += literals;
    if (at >= block.length) break; // the last sequence is literals alone
    at += 2;
    length += run(token & 15) + 4;
  }
  if (length > maxBytes) throw new Error('an LZ4 block is longer than its frame allows');
  return decompressLz4Raw(block, length);
}
