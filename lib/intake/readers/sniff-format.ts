import type { ByteSource } from '@/lib/intake/byte-source';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';

export type ReadableFormat = 'npy' | 'npz' | 'csv' | 'mat5' | 'hdf5' | 'arrow' | 'parquet' | 'json';

const FORMATS =
  'Send NPY, NPZ, CSV, TSV, MAT (version 6, 7 or 7.3), HDF5, NWB, Arrow, Feather, Parquet or JSON.';

/** Formats that are recognised in order to say clearly that they are not read. */
const foreign: { name: string; matches: (head: Buffer) => boolean; remedy: string }[] = [
  {
    name: 'a gzip archive',
    matches: (head) => head[0] === 0x1f && head[1] === 0x8b,
    remedy: 'Unpack it and send the file inside.',
  },
  {
    name: 'a pickle',
    matches: (head) => head[0] === 0x80 && head[1] >= 2 && head[1] <= 5,
    remedy: 'Pickles can run code and are never opened. Save the arrays as NPZ.',
  },
  {
    name: 'a PDF document',
    matches: (head) => head.subarray(0, 5).toString('latin1') === '%PDF-',
    remedy: 'Send the table as CSV.',
  },
  {
    name: 'an old Excel workbook',
    matches: (head) => head.subarray(0, 8).equals(Buffer.from('d0cf11e0a1b11ae1', 'hex')),
    remedy: 'Export the sheet as CSV.',
  },
];

/** Recognises a file's format by its content; its name is never looked at. */
export async function sniffFormat(source: ByteSource): Promise<ReadableFormat> {
  if (source.sizeBytes === 0)
    throw new IntakeRefusal('file-empty', 'The file is empty.', 'Check the export and send the file again.');
  const bytes = await source.read(0, Math.min(4096, source.sizeBytes));
  const head = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const npy = Buffer.from('934e554d5059', 'hex');
  if (
    head.subarray(0, npy.length).equals(npy.subarray(0, Math.min(npy.length, head.length))) &&
    head[0] === 0x93
  )
    return 'npy';
  if (head.subarray(0, 10).toString('latin1') === 'MATLAB 5.0') return 'mat5';
  const magic = head.toString('latin1', 0, 6);
  if (magic === 'ARROW1') return 'arrow';
  if (magic.startsWith('PAR1')) return 'parquet';
  if (/^(?:\ufeff)?\s*(?:\{\s*["}]|\[\s*[[{"\d\]-])/.test(head.toString('utf8'))) return 'json';
  if (await hasHdf5Signature(source, head)) return 'hdf5';
  if (head[0] === 0x50 && head[1] === 0x4b && (head[2] === 3 || head[2] === 5)) {
    if (head.includes('[Content_Types].xml'))
      throw new IntakeRefusal('format-unknown', 'This is an Excel workbook.', 'Export the sheet as CSV.');
    return 'npz';
  }
  const other = foreign.find((format) => format.matches(head));
  if (other) throw new IntakeRefusal('format-unknown', `This is ${other.name}.`, other.remedy);
  if (isBinary(head))
    throw new IntakeRefusal('format-unknown', 'The file is none of the formats that are read.', FORMATS);
  return 'csv';
}

/** More than a few control characters: not text. UTF-16 and stray NULs stay with the text reader, which names the line. */
function isBinary(head: Buffer): boolean {
  if ((head[0] === 0xff && head[1] === 0xfe) || (head[0] === 0xfe && head[1] === 0xff)) return false;
  let controls = 0;
  for (const byte of head) if (byte < 0x20 && byte !== 0x09 && byte !== 0x0a && byte !== 0x0d) controls += 1;
  return controls > Math.max(1, head.length * 0.02);
}

/** The signature stands at byte 0, or at 512, 1024, 2048 … after a user block. */
async function hasHdf5Signature(source: ByteSource, head: Buffer): Promise<boolean> {
  const signature = Buffer.from('894844460d0a1a0a', 'hex');
  if (head.subarray(0, 8).equals(signature)) return true;
  for (let at = 512; at + 8 <= source.sizeBytes && at <= 1024 * 1024; at *= 2) {
    const bytes = at + 8 <= head.length ? head.subarray(at, at + 8) : Buffer.from(await source.read(at, 8));
    if (bytes.equals(signature)) return true;
  }
  return false;
}
