import { v7 } from 'uuid';
import { db } from '@/db/connection';
import { findFile, findStoredCopy, insertFile } from '@/db/repositories/files';
import { addToOutbox } from '@/db/repositories/outbox';
import { findSession } from '@/db/repositories/recording-sessions';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { CreateFile, StoredFile } from '@/lib/contracts/file';
import { can } from '@/lib/policy/can';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { partSizeFor } from '@/lib/services/files/part-size';
import { toStoredFile } from '@/lib/services/files/to-stored-file';
import { notFound } from '@/lib/services/not-found';
import { pokeRelay } from '@/lib/services/outbox/poke-relay';
import { keys } from '@/storage/keys';
import { objectStore } from '@/storage/object-store';

/**
 * Begins an upload. Where a hash is named and the lab already has a whole file with it that the member may read, nothing
 * needs to be sent: the file is read at once from the stored bytes. A claimed hash alone grants nothing.
 */
export async function createFile(ctx: Ctx, input: CreateFile & { sessionId: string }): Promise<StoredFile> {
  authorize(ctx, 'file.upload');
  const { labId, userId } = ctx.actor;
  if ((await findSession(db(), labId, input.sessionId)) === null) throw notFound();
  const id = v7();
  const copy =
    input.sha256 !== undefined && can(ctx.actor, 'file.read', { labId })
      ? await findStoredCopy(db(), labId, input.sha256, input.sizeBytes)
      : null;
  const objectKey = copy?.object_key ?? keys.file(labId, input.sessionId, id);
  const uploadId =
    copy !== null || input.sizeBytes === 0 ? null : await objectStore().createMultipart(objectKey);
  const file = await inTransaction(async (trx) => {
    await insertFile(trx, {
      id,
      lab_id: labId,
      session_id: input.sessionId,
      name: input.name,
      size_bytes: input.sizeBytes,
      part_size_bytes: partSizeFor(input.sizeBytes),
      claimed_sha256: input.sha256 ?? null,
      object_key: objectKey,
      upload_id: uploadId,
      state: copy === null ? 'uploading' : 'reading',
      created_by: userId,
      created_at: new Date(),
    });
    if (copy !== null) await addToOutbox(trx, { kind: 'read-file', payload: { id } });
    await writeAudit(trx, ctx, {
      action: 'file.create',
      subjectKind: 'file',
      subjectId: id,
      detail: {
        sessionId: input.sessionId,
        name: input.name,
        sizeBytes: input.sizeBytes,
        isCopy: copy !== null,
      },
    });
    const row = await findFile(trx, labId, id);
    if (row === null) throw new Error('a file that was just made is missing');
    return row;
  }).catch(async (error: unknown) => {
    if (uploadId !== null) await objectStore().abortMultipart(objectKey, uploadId);
    throw error;
  });
  if (copy !== null) pokeRelay();
  return toStoredFile(file, []);
}
