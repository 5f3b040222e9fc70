import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { ReadableStream as WebReadableStream } from 'node:stream/web';
import { db } from '@/db/connection';
import { saveFilePart } from '@/db/repositories/file-parts';
import { findFile } from '@/db/repositories/files';
import { AppError } from '@/lib/errors/app-error';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { CheckPartStream } from '@/lib/services/files/check-part-stream';
import { expectedPartBytes } from '@/lib/services/files/expected-part-bytes';
import { notFound } from '@/lib/services/not-found';
import { ObjectMissing } from '@/storage/object-missing';
import { objectStore } from '@/storage/object-store';

export interface PutPartInput {
  fileId: string;
  /** From 1. */
  number: number;
  body: ReadableStream<Uint8Array> | null;
  /** How long the sender says the body is; left out or null where it says nothing. */
  contentLength?: number | null;
  /** The SHA-256 (hex) that the body must have; left out or null where the sender named none. */
  sha256?: string | null;
}

/**
 * Takes one part of an upload: its bytes stream through a hash into the store and are never held. The part is recorded
 * once the store has it; sending it again replaces it.
 */
export async function putPart(ctx: Ctx, input: PutPartInput): Promise<{ number: number; sha256: string }> {
  authorize(ctx, 'file.upload');
  const file = await findFile(db(), ctx.actor.labId, input.fileId);
  if (file === null) throw notFound();
  if (file.state !== 'uploading' || file.upload_id === null)
    throw new AppError('conflict', 'This file is complete; no more parts are taken.');
  const sizes = { sizeBytes: file.size_bytes, partSizeBytes: file.part_size_bytes };
  const expected = expectedPartBytes(sizes, input.number);
  if (expected === null)
    throw new AppError(
      'invalid-input',
      `The file has the parts 1 to ${Math.ceil(file.size_bytes / file.part_size_bytes)}; ${input.number} is not one of them.`,
      { faults: [{ pointer: '/n', code: 'part-number', detail: 'no such part' }] },
    );
  if (input.contentLength != null && input.contentLength !== expected)
    throw new AppError(
      input.contentLength > expected ? 'too-large' : 'invalid-input',
      `Part ${input.number} must be ${expected} bytes long; the request says ${input.contentLength}.`,
      { faults: [{ pointer: '', code: 'part-size', detail: `expected ${expected} bytes` }] },
    );
  const check = new CheckPartStream(expected);
  const source =
    input.body === null ? Readable.from([]) : Readable.fromWeb(input.body as WebReadableStream<Uint8Array>);
  // Whichever side fails first ends the other; a fault of the body is told rather than the store's complaint about it.
  const flow = pipeline(source, check).then(
    () => null,
    (error: unknown) => error,
  );
  let etag: string;
  try {
    etag = await objectStore().uploadPart(file.object_key, file.upload_id, input.number, check, expected);
  } catch (error) {
    check.destroy();
    const fault = await flow;
    if (fault instanceof AppError) throw fault;
    if (error instanceof ObjectMissing)
      throw new AppError(
        'conflict',
        'This upload has ended: it was completed, removed or has expired. Begin it again.',
      );
    if (source.errored !== null && !(error instanceof AppError))
      throw new AppError(
        'malformed-request',
        'The connection ended before the whole part had come. Send it again.',
        { cause: source.errored },
      );
    throw error;
  }
  const fault = await flow;
  if (fault !== null)
    throw fault instanceof Error ? fault : new Error('the part could not be read', { cause: fault });
  const { sha256 } = check;
  if (input.sha256 != null && input.sha256 !== sha256)
    throw new AppError(
      'invalid-input',
      `Part ${input.number} arrived damaged: its SHA-256 is not the one that was named. Send it again.`,
      {
        faults: [{ pointer: '', code: 'part-digest', detail: `the body has ${sha256}` }],
      },
    );
  await saveFilePart(db(), file.id, { number: input.number, etag, size_bytes: expected, sha256 });
  return { number: input.number, sha256 };
}
