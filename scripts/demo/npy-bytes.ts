/** Writes a uint8 array in the NPY format, version 1.0 (NumPy Enhancement Proposal 1), C order. */
export function npyBytes(values: Uint8Array, shape: number[]): Uint8Array {
  const dictionary = `{'descr': '|u1', 'fortran_order': False, 'shape': (${shape.join(', ')},), }`;
  const unpadded = 10 + dictionary.length + 1;
  const padded = dictionary + ' '.repeat((64 - (unpadded % 64)) % 64) + '\n';
  const bytes = new Uint8Array(10 + padded.length + values.length);
  bytes.set([0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59, 1, 0]);
  new DataView(bytes.buffer).setUint16(8, padded.length, true);
  bytes.set(new TextEncoder().encode(padded), 10);
  bytes.set(values, 10 + padded.length);
  return bytes;
}
