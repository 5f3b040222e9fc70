import type { Knex } from 'knex';

export interface FilePartRow {
  number: number;
  etag: string;
  size_bytes: number;
  sha256: string;
}

/** Records a part that the store has taken; a part that is sent again replaces the earlier one. */
export async function saveFilePart(q: Knex, fileId: string, part: FilePartRow): Promise<void> {
  await q('file_parts')
    .insert({ file_id: fileId, ...part })
    .onConflict(['file_id', 'number'])
    .merge(['etag', 'size_bytes', 'sha256']);
}

export async function listFileParts(q: Knex, fileId: string): Promise<FilePartRow[]> {
  return q('file_parts')
    .select('number', 'etag', 'size_bytes', 'sha256')
    .where({ file_id: fileId })
    .orderBy('number');
}

/** The part numbers that have arrived, by file. */
export async function listArrivedParts(q: Knex, fileIds: readonly string[]): Promise<Map<string, number[]>> {
  const byFile = new Map<string, number[]>();
  if (fileIds.length === 0) return byFile;
  const rows = (await q('file_parts')
    .select('file_id', 'number')
    .whereIn('file_id', fileIds)
    .orderBy(['file_id', 'number'])) as { file_id: string; number: number }[];
  for (const row of rows) byFile.set(row.file_id, [...(byFile.get(row.file_id) ?? []), row.number]);
  return byFile;
}
