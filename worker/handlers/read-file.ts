import { createHash } from 'node:crypto';
import { db } from '@/db/connection';
import { findFileForWorker, finishReading, type FileRow } from '@/db/repositories/files';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { Inspection } from '@/lib/intake/inspect-file';
import type { JobHandler } from '@/lib/jobs/consume';
import { publishLive } from '@/lib/jobs/publish-live';
import { log } from '@/lib/log/log';
import { lostProblem } from '@/lib/services/intake/lost-problem';
import { ReaderLost } from '@/lib/services/intake/reader-lost';
import { readerSeconds } from '@/lib/services/intake/reader-seconds';
import { runReader } from '@/lib/services/intake/run-reader';
import { objectStore } from '@/storage/object-store';

/**
 * Checks a whole file's hash and has it read in a process of its own: the file becomes readable, with its arrays, or
 * refused, with the reason. A second delivery finds the file read already and changes nothing.
 */
export const readFile: JobHandler = async ({ id }, { stopping }) => {
  const file = await findFileForWorker(db(), id);
  if (file?.state !== 'reading') return;
  const sha256 = await hashObject(file.object_key, stopping);
  const inspection =
    file.claimed_sha256 !== null && file.claimed_sha256 !== sha256
      ? wrongHash(file, sha256)
      : await inspect(file, stopping);
  const isDone = await inTransaction(async (trx) => {
    if (!(await finishReading(trx, id, { ...inspection, sha256 }))) return false;
    await writeAudit(
      trx,
      { actor: { labId: file.lab_id, userId: null }, requestId: `job-${id}` },
      {
        action: 'file.read',
        subjectKind: 'file',
        subjectId: id,
        detail: {
          state: inspection.state,
          format: inspection.format,
          sha256,
          codes: inspection.problems.map(({ code }) => code),
        },
      },
    );
    return true;
  });
  if (isDone)
    await publishLive({
      labId: file.lab_id,
      kind: 'file',
      sessionId: file.session_id,
      fileId: id,
      state: inspection.state,
    });
};

async function hashObject(key: string, stopping: AbortSignal): Promise<string> {
  const hash = createHash('sha256');
  for await (const slab of (await objectStore().getStream(key)) as AsyncIterable<Buffer>) {
    stopping.throwIfAborted();
    hash.update(slab);
  }
  return hash.digest('hex');
}

async function inspect(file: FileRow, stopping: AbortSignal): Promise<Inspection> {
  try {
    const { inspection } = await runReader(
      { kind: 'inspect', file: { fileId: file.id, name: file.name, sizeBytes: file.size_bytes } },
      'inspected',
      {
        read: (_fileId, offset, length) => objectStore().getRange(file.object_key, offset, length),
        maxSeconds: readerSeconds(file.size_bytes),
        abort: stopping,
        keepReady: true,
      },
    );
    return inspection;
  } catch (error) {
    if (!(error instanceof ReaderLost)) throw error;
    log.warn({ err: error, fileId: file.id }, 'a file was not read to its end');
    return { state: 'refused', format: null, arrays: [], problems: [lostProblem(error, file.name)] };
  }
}

function wrongHash(file: FileRow, sha256: string): Inspection {
  return {
    state: 'refused',
    format: null,
    arrays: [],
    problems: [
      {
        code: 'file-hash',
        severity: 'stops',
        message: `The file that arrived has the SHA-256 ${sha256}, not the one that was named when the upload began.`,
        remedy: 'The file changed or was damaged on its way: remove it and send it again.',
        place: { file: file.name },
      },
    ],
  };
}
