import type { ElementType } from '@/lib/intake/readers/element-type';
import type { NumberChunk, ValueChunk } from '@/lib/intake/readers/readable-file';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';

/** Turns a stream of bytes into chunks of values; a value that is split between two slabs is put together. */
export async function* decodeValues(
  slabs: AsyncIterable<Uint8Array>,
  type: ElementType,
  path: string,
): AsyncGenerator<ValueChunk, void, undefined> {
  let carried = new Uint8Array(0);
  for await (const slab of slabs) {
    let bytes = slab;
    if (carried.length > 0) {
      bytes = new Uint8Array(carried.length + slab.length);
      bytes.set(carried);
      bytes.set(slab, carried.length);
    }
    const whole = type.itemBytes === 0 ? 0 : bytes.length - (bytes.length % type.itemBytes);
    if (whole > 0) yield decode(bytes.subarray(0, whole), type, path);
    carried = bytes.slice(whole);
  }
}

function decode(bytes: Uint8Array, type: ElementType, path: string): ValueChunk {
  if (type.dtype === 'string') return decodeText(bytes, type, path);
  const { itemBytes } = type;
  // Typed arrays need an aligned start; swapping changes the bytes, so both cases take a copy.
  const swap = itemBytes > 1 && !type.littleEndian;
  const own = swap || bytes.byteOffset % itemBytes !== 0 ? bytes.slice() : bytes;
  if (swap) swapBytes(own, itemBytes);
  return viewNumbers(own, type.dtype);
}

function swapBytes(bytes: Uint8Array, itemBytes: number): void {
  const buffer = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (itemBytes === 2) buffer.swap16();
  else if (itemBytes === 4) buffer.swap32();
  else buffer.swap64();
}

function viewNumbers(bytes: Uint8Array, dtype: Exclude<ElementType['dtype'], 'string'>): NumberChunk {
  const at = bytes.byteOffset;
  const size = bytes.byteLength;
  const buffer = bytes.buffer;
  switch (dtype) {
    case 'bool':
      return Uint8Array.from(bytes, (byte) => (byte === 0 ? 0 : 1));
    case 'uint8':
      return bytes;
    case 'int8':
      return new Int8Array(buffer, at, size);
    case 'int16':
      return new Int16Array(buffer, at, size / 2);
    case 'uint16':
      return new Uint16Array(buffer, at, size / 2);
    case 'int32':
      return new Int32Array(buffer, at, size / 4);
    case 'uint32':
      return new Uint32Array(buffer, at, size / 4);
    case 'int64':
      return new BigInt64Array(buffer, at, size / 8);
    case 'uint64':
      return new BigUint64Array(buffer, at, size / 8);
    case 'float16':
      return Float32Array.from(new Uint16Array(buffer, at, size / 2), halfToNumber);
    case 'float32':
      return new Float32Array(buffer, at, size / 4);
    case 'float64':
      return new Float64Array(buffer, at, size / 8);
  }
}

/** IEEE 754 binary16: 1 sign, 5 exponent, 10 fraction bits. */
function halfToNumber(bits: number): number {
  const sign = bits & 0x8000 ? -1 : 1;
  const exponent = (bits >> 10) & 0x1f;
  const fraction = bits & 0x3ff;
  if (exponent === 0) return sign * fraction * 2 ** -24;
  if (exponent === 0x1f) return fraction === 0 ? sign * Infinity : NaN;
  return sign * (1024 + fraction) * 2 ** (exponent - 25);
}

function decodeText(bytes: Uint8Array, type: ElementType, path: string): string[] {
  const n = bytes.length / type.itemBytes;
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const values: string[] = new Array<string>(n);
  for (let item = 0; item < n; item++) {
    const from = item * type.itemBytes;
    let text = '';
    if (type.text === 'S') {
      let end = from + type.itemBytes;
      while (end > from && bytes[end - 1] === 0) end -= 1;
      text = Buffer.from(bytes.buffer, bytes.byteOffset + from, end - from).toString('latin1');
    } else
      for (let at = from; at < from + type.itemBytes; at += 4) {
        const point = view.getUint32(at, type.littleEndian);
        if (point === 0) break;
        if (point > 0x10ffff || (point >= 0xd800 && point <= 0xdfff))
          throw new IntakeRefusal(
            'text-encoding',
            `A text value holds ${point}, which is no Unicode character.`,
            'Export the array again.',
            path === '' ? {} : { path },
          );
        text += String.fromCodePoint(point);
      }
    values[item] = text;
  }
  return values;
}
