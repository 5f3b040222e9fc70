import { db } from '@/db/connection';
import { listFileParts } from '@/db/repositories/file-parts';
import { findFile, startReading, type FileRow } from '@/db/repositories/files';
import { addToOutbox } from '@/db/repositories/outbox';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { StoredFile } from '@/lib/contracts/file';
import { AppError } from '@/lib/errors/app-error';
import { publishLive } from '@/lib/jobs/publish-live';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { toStoredFile } from '@/lib/services/files/to-stored-file';
import { notFound } from '@/lib/services/not-found';
import { pokeRelay } from '@/lib/services/outbox/poke-relay';
import { ObjectMissing } from '@/storage/object-missing';
import { objectStore } from '@/storage/object-store';

/**
 * Ends an upload: puts the parts together in the store and has the worker check the whole file's hash and read it.
 * Completing twice is the same as once.
 */
export async function completeFile(ctx: Ctx, input: { fileId: string }): Promise<StoredFile> {
  authorize(ctx, 'file.upload');
  const { labId } = ctx.actor;
  const file = await findFile(db(), labId, input.fileId);
  if (file === null) throw notFound();
  if (file.state === 'uploading') {
    await putTogether(file);
    const isFirst = await inTransaction(async (trx) => {
      if (!(await startReading(trx, file.id))) return false;
      await addToOutbox(trx, { kind: 'read-file', payload: { id: file.id } });
      await writeAudit(trx, ctx, { action: 'file.complete', subjectKind: 'file', subjectId: file.id });
      return true;
    });
    if (isFirst) {
      pokeRelay();
      await publishLive({
        labId,
        kind: 'file',
        sessionId: file.session_id,
        fileId: file.id,
        state: 'reading',
      });
    }
  }
  const now = await findFile(db(), labId, input.fileId);
  if (now === null) throw notFound();
  return toStoredFile(
    now,
    (await listFileParts(db(), now.id)).map((part) => part.number),
  );
}

async function putTogether(file: FileRow): Promise<void> {
  const store = objectStore();
  if (file.upload_id === null) {
    await store.put(file.object_key, new Uint8Array(0));
    return;
  }
  const parts = await listFileParts(db(), file.id);
  const nParts = Math.ceil(file.size_bytes / file.part_size_bytes);
  if (parts.length !== nParts) {
    const arrived = new Set(parts.map((part) => part.number));
    const missing = Array.from({ length: nParts }, (_, at) => at + 1).filter(
      (number) => !arrived.has(number),
    );
    const listed = `${missing.slice(0, 10).join(', ')}${missing.length > 10 ? ' …' : ''}`;
    throw new AppError(
      'conflict',
      `${missing.length} of ${nParts} parts have not arrived: ${listed}. Send them first.`,
      {
        faults: missing
          .slice(0, 100)
          .map((number) => ({ pointer: '', code: 'part-missing', detail: String(number) })),
      },
    );
  }
  try {
    await store.completeMultipart(file.object_key, file.upload_id, parts);
  } catch (error) {
    if (!(error instanceof ObjectMissing)) throw error;
    // An earlier call may have put the parts together and failed afterwards.
    if ((await store.head(file.object_key))?.sizeBytes === file.size_bytes) return;
    throw new AppError('conflict', 'This upload has expired in the store. Remove the file and begin again.', {
      cause: error,
    });
  }
}
