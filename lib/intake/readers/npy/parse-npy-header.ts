import type { Dtype } from '@/lib/intake/readers/readable-file';
import type { NpyHeader } from '@/lib/intake/readers/npy/npy-header';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';

const MAX_HEADER_BYTES = 65_536;
const MAX_DIMENSIONS = 32;
const RESAVE = 'Save the array again with a plain numeric type and send that file.';

/** Bytes of a file's beginning that are enough to parse any NPY header that we accept. */
export const npyHeaderProbeBytes = MAX_HEADER_BYTES + 12;

/**
 * Parses and checks the header of an NPY array, format versions 1 to 3, from the first bytes of the array.
 *
 * @param head the array's first bytes, at least min(sizeBytes, npyHeaderProbeBytes) of them
 * @param sizeBytes how many bytes the whole array occupies; the header must account for each of them
 * @throws IntakeRefusal before anything is allocated for the data
 * Source: the published NPY format description (numpy.lib.format, versions 1.0, 2.0, 3.0).
 */
export function parseNpyHeader(head: Uint8Array, sizeBytes: number, path: string): NpyHeader {
  const refuse = (code: string, message: string, remedy = RESAVE): never => {
    throw new IntakeRefusal(code, message, remedy, path === '' ? {} : { path });
  };
  const magic = [0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59];
  if (head.length < 6 || magic.some((byte, at) => head[at] !== byte))
    refuse('npy-magic', 'The array does not begin with the NPY signature.');
  if (head.length < 10)
    refuse('npy-truncated', `The file ends after ${sizeBytes} bytes, within the NPY header.`);
  const major = head[6];
  if (major < 1 || major > 3 || head[7] !== 0)
    refuse('npy-version', `NPY version ${major}.${head[7]} is not known; 1.0, 2.0 and 3.0 are.`);
  const lengthBytes = major === 1 ? 2 : 4;
  if (head.length < 8 + lengthBytes)
    refuse('npy-truncated', `The file ends after ${sizeBytes} bytes, within the NPY header.`);
  const view = new DataView(head.buffer, head.byteOffset, head.byteLength);
  const textBytes = major === 1 ? view.getUint16(8, true) : view.getUint32(8, true);
  const headerBytes = 8 + lengthBytes + textBytes;
  if (textBytes > MAX_HEADER_BYTES)
    refuse('npy-header-size', `The NPY header claims to be ${textBytes} bytes long.`);
  if (headerBytes > sizeBytes || headerBytes > head.length)
    refuse('npy-truncated', `The NPY header needs ${headerBytes} bytes, the file has ${sizeBytes}.`);
  let text = '';
  try {
    text = new TextDecoder(major === 3 ? 'utf-8' : 'latin1', { fatal: true }).decode(
      head.subarray(8 + lengthBytes, headerBytes),
    );
  } catch {
    refuse('npy-header', 'The NPY header is not valid UTF-8.');
  }
  const dict = parseDict(text);
  if (dict === null)
    return refuse(
      'npy-header',
      'The NPY header is not the dictionary of descr, fortran_order and shape that the format asks for.',
    );
  if (dict.descr === null)
    return refuse(
      'npy-structured',
      'The array is a structured array (a record of fields).',
      'Save each field as an array of its own.',
    );
  const type = parseDescr(dict.descr, refuse);
  if (dict.shape.length > MAX_DIMENSIONS)
    refuse('npy-shape', `The array claims ${dict.shape.length} dimensions.`);
  let nValues = 1;
  for (const length of dict.shape) {
    nValues *= length;
    if (!Number.isSafeInteger(length) || !Number.isSafeInteger(nValues * Math.max(1, type.itemBytes)))
      refuse('npy-shape', `The shape (${dict.shape.join(', ')}) has more values than any file can hold.`);
  }
  const dataBytes = nValues * type.itemBytes;
  const present = sizeBytes - headerBytes;
  const claim = `The header says ${dict.shape.join(' × ') || 'one value'} of ${type.dtype}, ${dataBytes} bytes; the file holds ${present}.`;
  if (present < dataBytes)
    refuse('npy-truncated', claim, 'The file was cut short or its header is wrong: export it again.');
  if (present > dataBytes) refuse('npy-trailing-bytes', claim, 'Save one array a file, and export it again.');
  return { ...type, order: dict.fortran ? 'F' : 'C', shape: dict.shape, nValues, headerBytes, dataBytes };
}

/** A strict reading of the one form of dictionary literal that the format allows; null where it is anything else. */
function parseDict(text: string): { descr: string | null; fortran: boolean; shape: number[] } | null {
  if (!/^\{.*\}[ \n]*$/s.test(text)) return null;
  let rest = text.replace(/[ \n]+$/, '').slice(1, -1);
  let descr: string | null | undefined;
  let fortran: boolean | undefined;
  let shape: number[] | undefined;
  while (rest.trim() !== '') {
    const key = /^\s*(?:'([a-z_]+)'|"([a-z_]+)")\s*:\s*/.exec(rest);
    if (key === null) return null;
    rest = rest.slice(key[0].length);
    const name = key[1] ?? key[2];
    let value: RegExpExecArray | null;
    if (name === 'descr' && descr === undefined) {
      if (rest.startsWith('[') || rest.startsWith('(')) return { descr: null, fortran: false, shape: [] };
      value = /^(?:'([^'\\]*)'|"([^"\\]*)")/.exec(rest);
      if (value !== null) descr = value[1] ?? value[2];
    } else if (name === 'fortran_order' && fortran === undefined) {
      value = /^(True|False)/.exec(rest);
      if (value !== null) fortran = value[1] === 'True';
    } else if (name === 'shape' && shape === undefined) {
      value = /^\(\s*(?:(\d{1,20})L?\s*,\s*)?((?:\d{1,20}L?\s*,?\s*)*)\)/.exec(rest);
      if (value !== null) {
        const items = value[0]
          .slice(1, -1)
          .replace(/L/g, '')
          .split(',')
          .map((item) => item.trim());
        if (items.at(-1) === '') items.pop();
        else if (items.length === 1) return null;
        if (items.some((item) => !/^\d+$/.test(item))) return null;
        shape = items.map(Number);
      }
    } else return null;
    if (value === null) return null;
    rest = rest.slice(value[0].length).replace(/^\s*/, '');
    if (rest !== '') {
      if (!rest.startsWith(',')) return null;
      rest = rest.slice(1);
    }
  }
  return descr === undefined || fortran === undefined || shape === undefined
    ? null
    : { descr, fortran, shape };
}

const numeric: Readonly<Record<string, Dtype>> = {
  b1: 'bool',
  i1: 'int8',
  u1: 'uint8',
  i2: 'int16',
  u2: 'uint16',
  i4: 'int32',
  u4: 'uint32',
  i8: 'int64',
  u8: 'uint64',
  f2: 'float16',
  f4: 'float32',
  f8: 'float64',
};

function parseDescr(
  descr: string,
  refuse: (code: string, message: string, remedy?: string) => never,
): Pick<NpyHeader, 'dtype' | 'itemBytes' | 'littleEndian' | 'text'> {
  const parts = /^([<>|=]?)([a-zA-Z])(\d{0,9})(\[.*\])?$/.exec(descr);
  if (parts === null) return refuse('npy-type', `The type “${descr.slice(0, 40)}” is not known.`);
  const [, order, kind, size] = parts;
  if (kind === 'O')
    return refuse(
      'npy-pickle',
      'The array holds pickled objects. Reading them would run code from the file, so they are never opened.',
      'Save the values as a plain numeric or text array (for lists of unequal length, as one long array and an index).',
    );
  const littleEndian = order !== '>';
  if ((kind === 'U' || kind === 'S') && size !== '') {
    const itemBytes = Number(size) * (kind === 'U' ? 4 : 1);
    return { dtype: 'string', itemBytes, littleEndian, text: kind };
  }
  const name = `${kind}${size}`;
  const dtype = Object.hasOwn(numeric, name) ? numeric[name] : undefined;
  if (dtype === undefined)
    return refuse(
      'npy-type',
      `The type “${descr.slice(0, 40)}” is not one that a session needs (whole numbers, floats, text).`,
    );
  return { dtype, itemBytes: Number(size), littleEndian };
}
