/** Builds NPY bytes by hand, right or wrong in any one part; the header is padded to 64 bytes as the format asks. */
export function makeNpy(
  options: {
    descr?: string;
    fortran?: string;
    shape?: string;
    data?: Uint8Array;
    version?: [number, number];
    header?: string;
    headerBytes?: number;
    magic?: number[];
  } = {},
): Uint8Array {
  const {
    descr = "'|u1'",
    fortran = 'False',
    shape = '(2, 3, 4)',
    data = new Uint8Array(24),
    version = [1, 0],
  } = options;
  const text = options.header ?? `{'descr': ${descr}, 'fortran_order': ${fortran}, 'shape': ${shape}, }`;
  const lengthBytes = version[0] === 1 ? 2 : 4;
  const unpadded = 8 + lengthBytes + new TextEncoder().encode(text).length + 1;
  const padded = new TextEncoder().encode(`${text}${' '.repeat((64 - (unpadded % 64)) % 64)}\n`);
  const head = new Uint8Array(8 + lengthBytes);
  head.set(options.magic ?? [0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59]);
  head[6] = version[0];
  head[7] = version[1];
  const view = new DataView(head.buffer);
  const length = options.headerBytes ?? padded.length;
  if (lengthBytes === 2) view.setUint16(8, length, true);
  else view.setUint32(8, length, true);
  return Uint8Array.from(Buffer.concat([head, padded, data]));
}
