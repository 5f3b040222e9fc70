import { deflateSync } from 'node:zlib';

type Part = Uint8Array | number[];

const bytesOf = (part: Part): Buffer => Buffer.from(part as Uint8Array);

/** One data element: a tag of 8 bytes and its data, padded to 8 (unless `padded` is false); `nBytes` may lie. */
export function element(
  type: number,
  data: Part,
  options: { nBytes?: number; padded?: boolean } = {},
): Buffer {
  const body = bytesOf(data);
  const tag = Buffer.alloc(8);
  tag.writeUInt32LE(type, 0);
  tag.writeUInt32LE((options.nBytes ?? body.length) >>> 0, 4);
  const padding = options.padded === false ? 0 : (8 - (body.length % 8)) % 8;
  return Buffer.concat([tag, body, Buffer.alloc(padding)]);
}

export const int32s = (...values: number[]): Buffer => Buffer.from(Int32Array.from(values).buffer);

/** A matrix element of class uint8 unless told otherwise; every part may be replaced. */
export function matrix(
  options: {
    name?: string;
    mxClass?: number;
    flags?: number;
    shape?: number[];
    parts?: Buffer[];
    before?: Buffer;
    nBytes?: number;
  } = {},
): Buffer {
  const { name = 'x', mxClass = 9, flags = 0, shape = [2, 3] } = options;
  const size = shape.reduce((product, length) => product * length, 1);
  const body = Buffer.concat([
    options.before ??
      Buffer.concat([
        element(6, int32s(mxClass | flags, 0)),
        element(5, int32s(...shape)),
        element(1, Buffer.from(name, 'latin1')),
      ]),
    ...(options.parts ?? [element(2, Buffer.alloc(Math.max(0, Math.min(size, 1 << 20)), 1))]),
  ]);
  return element(14, body, {
    padded: false,
    ...(options.nBytes === undefined ? {} : { nBytes: options.nBytes }),
  });
}

export const packed = (inner: Buffer): Buffer => element(15, deflateSync(inner), { padded: false });

/** A MAT file of level 5 around its elements. */
export function makeMat5(elements: Buffer[], options: { version?: number; mark?: string } = {}): Uint8Array {
  const header = Buffer.alloc(128, 0x20);
  header.write('MATLAB 5.0 MAT-file, made for a test', 0, 'latin1');
  header.writeUInt16LE(options.version ?? 0x0100, 124);
  header.write(options.mark ?? 'IM', 126, 'latin1');
  return Uint8Array.from(Buffer.concat([header, ...elements]));
}
