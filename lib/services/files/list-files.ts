import { db } from '@/db/connection';
import { listArrivedParts } from '@/db/repositories/file-parts';
import { listFileRows } from '@/db/repositories/files';
import { findSession } from '@/db/repositories/recording-sessions';
import type { StoredFile } from '@/lib/contracts/file';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { toStoredFile } from '@/lib/services/files/to-stored-file';
import { notFound } from '@/lib/services/not-found';
import type { PageInput } from '@/lib/services/page-input';
import { pageOfRows } from '@/lib/services/page-of-rows';

/** A session's files, newest first. */
export async function listFiles(
  ctx: Ctx,
  input: { sessionId: string } & PageInput,
): Promise<{ items: StoredFile[]; nextCursor: string | null }> {
  authorize(ctx, 'file.read');
  const { labId } = ctx.actor;
  if ((await findSession(db(), labId, input.sessionId)) === null) throw notFound();
  const page = await pageOfRows(
    input,
    (beforeId, limit) => listFileRows(db(), labId, input.sessionId, beforeId, limit),
    (row) => row,
  );
  const parts = await listArrivedParts(
    db(),
    page.items.map((row) => row.id),
  );
  return { ...page, items: page.items.map((row) => toStoredFile(row, parts.get(row.id) ?? [])) };
}
