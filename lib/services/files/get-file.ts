import { db } from '@/db/connection';
import { listArrivedParts } from '@/db/repositories/file-parts';
import { findFile } from '@/db/repositories/files';
import type { StoredFile } from '@/lib/contracts/file';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { toStoredFile } from '@/lib/services/files/to-stored-file';
import { notFound } from '@/lib/services/not-found';

/** One file: where it stands, which parts have arrived, and what was found in it. */
export async function getFile(ctx: Ctx, input: { fileId: string }): Promise<StoredFile> {
  authorize(ctx, 'file.read');
  const row = await findFile(db(), ctx.actor.labId, input.fileId);
  if (row === null) throw notFound();
  const parts = await listArrivedParts(db(), [row.id]);
  return toStoredFile(row, parts.get(row.id) ?? []);
}
