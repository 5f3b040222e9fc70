import type { FileRow } from '@/db/repositories/files';
import type { StoredFile } from '@/lib/contracts/file';

export function toStoredFile(row: FileRow, parts: number[]): StoredFile {
  return {
    id: row.id,
    sessionId: row.session_id,
    name: row.name,
    sizeBytes: row.size_bytes,
    partSizeBytes: row.part_size_bytes,
    sha256: row.sha256,
    state: row.state,
    format: row.format,
    parts,
    arrays: row.arrays,
    problems: row.problems,
    createdAt: row.created_at.toISOString(),
  };
}
