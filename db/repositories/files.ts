import type { Knex } from 'knex';
import type { ArrayFact, FileFormat, StoredFile } from '@/lib/contracts/file';
import type { Problem } from '@/lib/contracts/problem';

export interface FileRow {
  id: string;
  lab_id: string;
  session_id: string;
  name: string;
  size_bytes: number;
  part_size_bytes: number;
  claimed_sha256: string | null;
  sha256: string | null;
  object_key: string;
  upload_id: string | null;
  state: StoredFile['state'];
  format: FileFormat | null;
  arrays: ArrayFact[];
  problems: Problem[];
  created_by: string;
  created_at: Date;
}

export async function insertFile(
  trx: Knex,
  row: Omit<FileRow, 'sha256' | 'format' | 'arrays' | 'problems'>,
): Promise<void> {
  await trx('files').insert({ ...row, arrays: '[]', problems: '[]' });
}

export async function findFile(q: Knex, labId: string, fileId: string): Promise<FileRow | null> {
  return ((await q('files').where({ id: fileId, lab_id: labId }).first()) as FileRow | undefined) ?? null;
}

/** The file whatever its lab: only for the worker, which acts on ids from the queue. */
export async function findFileForWorker(q: Knex, fileId: string): Promise<FileRow | null> {
  return ((await q('files').where({ id: fileId }).first()) as FileRow | undefined) ?? null;
}

/** Locks the file's row until the transaction ends. */
export async function lockFile(
  trx: Knex.Transaction,
  labId: string,
  fileId: string,
): Promise<FileRow | null> {
  const row = await trx('files').where({ id: fileId, lab_id: labId }).forUpdate().first();
  return (row as FileRow | undefined) ?? null;
}

export async function findSessionFiles(
  q: Knex,
  labId: string,
  sessionId: string,
  ids: readonly string[],
): Promise<FileRow[]> {
  return q('files').where({ lab_id: labId, session_id: sessionId }).whereIn('id', ids);
}

/** A session's files, newest first, before the id `beforeId`. */
export async function listFileRows(
  q: Knex,
  labId: string,
  sessionId: string,
  beforeId: string | null,
  limit: number,
): Promise<FileRow[]> {
  const query = q('files').where({ lab_id: labId, session_id: sessionId }).orderBy('id', 'desc').limit(limit);
  if (beforeId !== null) void query.where('id', '<', beforeId);
  return query;
}

/** A whole file of the lab with that verified hash and size, whose bytes are stored. */
export async function findStoredCopy(
  q: Knex,
  labId: string,
  sha256: string,
  sizeBytes: number,
): Promise<FileRow | null> {
  const row = await q('files')
    .where({ lab_id: labId, sha256, size_bytes: sizeBytes })
    .whereIn('state', ['readable', 'refused'])
    .orderBy('id')
    .first();
  return (row as FileRow | undefined) ?? null;
}

/** Moves a file from uploading to reading; false where it is not uploading any more. */
export async function startReading(trx: Knex, fileId: string): Promise<boolean> {
  const changed = await trx('files')
    .where({ id: fileId, state: 'uploading' })
    .update({ state: 'reading', upload_id: null });
  return changed === 1;
}

/** Writes what reading found; false where the file is not being read any more (a second delivery, or removed). */
export async function finishReading(
  trx: Knex,
  fileId: string,
  found: {
    state: 'readable' | 'refused';
    sha256: string;
    format: FileFormat | null;
    arrays: ArrayFact[];
    problems: Problem[];
  },
): Promise<boolean> {
  const changed = await trx('files')
    .where({ id: fileId, state: 'reading' })
    .update({ ...found, arrays: JSON.stringify(found.arrays), problems: JSON.stringify(found.problems) });
  return changed === 1;
}

export async function deleteFile(trx: Knex, fileId: string): Promise<void> {
  await trx('files').where({ id: fileId }).delete();
}

export async function countFilesWithObject(q: Knex, objectKey: string): Promise<number> {
  const row = await q('files').where({ object_key: objectKey }).count({ n: '*' }).first();
  return Number(row?.n ?? 0);
}
