import { fromRandomAccessReader, type Entry, type ZipFile } from 'yauzl';
import type { ByteSource } from '@/lib/intake/byte-source';
import type { Problem } from '@/lib/contracts/problem';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { decodeValues } from '@/lib/intake/readers/decode-values';
import { npyHeaderProbeBytes, parseNpyHeader } from '@/lib/intake/readers/npy/parse-npy-header';
import { ByteSourceReader } from '@/lib/intake/readers/npz/byte-source-reader';
import { inflateEntry } from '@/lib/intake/readers/npz/inflate-entry';
import type { ReadableArray, ReadableFile } from '@/lib/intake/readers/readable-file';

const MAX_ENTRIES = 10_000;
const BOMB_MIN_BYTES = 64 * 1024 * 1024;
const BOMB_RATIO = 200;
const RESAVE = 'Write the archive again from the arrays and send that file.';

/**
 * Opens an NPZ archive (a ZIP of NPY arrays, stored or deflated). Names from inside are only ever labels: they are
 * checked and never used as a path. Sizes are checked against the NPY headers before anything is allocated, and each
 * array's CRC-32 is checked whenever it is read to its end.
 */
export async function openNpz(source: ByteSource): Promise<ReadableFile> {
  const zip = await openZip(source);
  const entries = await listEntries(zip, source.sizeBytes);
  const arrays: ReadableArray[] = [];
  const problems: Problem[] = [];
  for (const entry of entries) {
    if (!entry.fileName.endsWith('.npy')) {
      problems.push({
        code: 'npz-foreign-member',
        severity: 'notes',
        message: `The archive holds “${entry.fileName}”, which is not an array and is left aside.`,
        place: { path: entry.fileName },
      });
      continue;
    }
    arrays.push(await openMember(zip, entry));
  }
  if (arrays.length === 0) throw new IntakeRefusal('npz-empty', 'The archive holds no NPY array.', RESAVE);
  return { format: 'npz', arrays, problems, close: () => zip.close() };
}

function openZip(source: ByteSource): Promise<ZipFile> {
  return new Promise((resolve, reject) => {
    fromRandomAccessReader(
      new ByteSourceReader(source),
      source.sizeBytes,
      { lazyEntries: true, autoClose: false, strictFileNames: true, validateEntrySizes: true },
      (error, zip) => {
        if (error)
          reject(new IntakeRefusal('zip-structure', `The ZIP archive is damaged: ${error.message}.`, RESAVE));
        else resolve(zip);
      },
    );
  });
}

function listEntries(zip: ZipFile, fileBytes: number): Promise<Entry[]> {
  return new Promise((resolve, reject) => {
    const entries: Entry[] = [];
    const names = new Set<string>();
    let packedBytes = 0;
    const fail = (code: string, message: string, remedy: string, path?: string): void =>
      reject(new IntakeRefusal(code, message, remedy, path === undefined ? {} : { path }));
    zip.on('error', (error: Error) => {
      const names = /file ?name|relative path|absolute path|characters in/i.test(error.message);
      fail(
        names ? 'zip-name' : 'zip-structure',
        `The ZIP archive is not acceptable: ${error.message}.`,
        RESAVE,
      );
    });
    zip.on('entry', (entry: Entry) => {
      const name = entry.fileName;
      const fault = entryFault(entry, names);
      packedBytes += entry.compressedSize;
      if (fault) return fail(fault.code, fault.message, fault.remedy ?? RESAVE, name);
      if (packedBytes > fileBytes)
        return fail(
          'zip-overlap',
          'The members of the archive together are longer than the archive itself.',
          RESAVE,
          name,
        );
      names.add(name);
      entries.push(entry);
      if (entries.length > MAX_ENTRIES)
        return fail('zip-entries', `The archive has more than ${MAX_ENTRIES} members.`, RESAVE);
      zip.readEntry();
    });
    zip.on('end', () => resolve(entries));
    zip.readEntry();
  });
}

function entryFault(
  entry: Entry,
  names: ReadonlySet<string>,
): { code: string; message: string; remedy?: string } | null {
  const name = entry.fileName;
  // eslint-disable-next-line no-control-regex -- control characters in names are what is looked for
  if (name === '' || name.length > 300 || /[\u0000-\u001f\u007f]/.test(name) || /[/\\]|^\.\.?$/.test(name))
    return {
      code: 'zip-name',
      message: `A member is named “${name.slice(0, 80)}”; a member must have a plain name without a folder.`,
    };
  if (names.has(name)) return { code: 'zip-duplicate-name', message: `Two members are named “${name}”.` };
  if (entry.isEncrypted())
    return {
      code: 'zip-encrypted',
      message: `The member “${name}” is encrypted.`,
      remedy: 'Send the archive without a password.',
    };
  if (entry.compressionMethod !== 0 && entry.compressionMethod !== 8)
    return {
      code: 'zip-compression',
      message: `The member “${name}” is packed by method ${entry.compressionMethod}; only stored and deflate are read.`,
    };
  if (entry.uncompressedSize > BOMB_MIN_BYTES && entry.uncompressedSize > BOMB_RATIO * entry.compressedSize)
    return {
      code: 'zip-bomb',
      message: `The member “${name}” claims to grow from ${entry.compressedSize} to ${entry.uncompressedSize} bytes, more than recorded data ever does.`,
      remedy: 'If the array is real, send it as an NPY file.',
    };
  return null;
}

async function openMember(zip: ZipFile, entry: Entry): Promise<ReadableArray> {
  const path = entry.fileName.slice(0, -'.npy'.length);
  const head = await readHead(zip, entry, path);
  const header = parseNpyHeader(head, entry.uncompressedSize, path);
  return {
    path,
    dtype: header.dtype,
    shape: header.shape,
    order: header.order,
    chunks: () => decodeValues(inflateEntry(zip, entry, header.headerBytes, path), header, path),
  };
}

async function readHead(zip: ZipFile, entry: Entry, path: string): Promise<Uint8Array> {
  const parts: Uint8Array[] = [];
  let length = 0;
  const wanted = Math.min(npyHeaderProbeBytes, entry.uncompressedSize);
  for await (const part of inflateEntry(zip, entry, 0, path)) {
    parts.push(part);
    length += part.length;
    if (length >= wanted) break;
  }
  return Buffer.concat(parts).subarray(0, wanted);
}
