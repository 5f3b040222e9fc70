import { countFilesWithObject, deleteFile, lockFile } from '@/db/repositories/files';
import { isFileMapped } from '@/db/repositories/intakes';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { AppError } from '@/lib/errors/app-error';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { objectStore } from '@/storage/object-store';

/** Takes a file away, complete or not, as long as no intake uses it: what a session was made from is kept. */
export async function removeFile(ctx: Ctx, input: { fileId: string }): Promise<void> {
  authorize(ctx, 'file.upload');
  const { file, isLast } = await inTransaction(async (trx) => {
    const row = await lockFile(trx, ctx.actor.labId, input.fileId);
    if (row === null) throw notFound();
    if (await isFileMapped(trx, row.session_id, row.id))
      throw new AppError(
        'conflict',
        'The session’s data were made from this file, so it is kept. Bring in a corrected file beside it.',
      );
    await deleteFile(trx, row.id);
    await writeAudit(trx, ctx, {
      action: 'file.remove',
      subjectKind: 'file',
      subjectId: row.id,
      detail: { sessionId: row.session_id, name: row.name, sha256: row.sha256 },
    });
    return { file: row, isLast: (await countFilesWithObject(trx, row.object_key)) === 0 };
  });
  // Only after the commit: a file must never be listed whose bytes are gone.
  if (file.upload_id !== null) await objectStore().abortMultipart(file.object_key, file.upload_id);
  if (isLast) await objectStore().remove(file.object_key);
}
