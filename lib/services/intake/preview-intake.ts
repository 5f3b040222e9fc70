import { db } from '@/db/connection';
import { findSession } from '@/db/repositories/recording-sessions';
import type { IntakePreview, PreviewInput } from '@/lib/contracts/intake-answer';
import { AppError } from '@/lib/errors/app-error';
import { log } from '@/lib/log/log';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { lostProblem } from '@/lib/services/intake/lost-problem';
import { mappedFiles } from '@/lib/services/intake/mapped-files';
import { ReaderLost } from '@/lib/services/intake/reader-lost';
import { runReader } from '@/lib/services/intake/run-reader';
import { notFound } from '@/lib/services/not-found';
import { objectStore } from '@/storage/object-store';

const MAX_AT_ONCE = 2;
const MAX_SECONDS = 45;
let running = 0;

/** Reads the session as a mapping says and gives its first trials and every problem; nothing is written. */
export async function previewIntake(
  ctx: Ctx,
  input: PreviewInput & { sessionId: string },
): Promise<IntakePreview> {
  authorize(ctx, 'file.read');
  const { labId } = ctx.actor;
  if ((await findSession(db(), labId, input.sessionId)) === null) throw notFound();
  const rows = await mappedFiles(db(), labId, input.sessionId, input.intake);
  if (running >= MAX_AT_ONCE)
    throw new AppError('rate-limited', 'Other previews are being read. Try again in a few seconds.', {
      retryAfterSeconds: 3,
    });
  const keyOf = new Map(rows.map((row) => [row.id, row.object_key]));
  running += 1;
  try {
    const { preview } = await runReader(
      {
        kind: 'preview',
        files: rows.map((row) => ({ fileId: row.id, name: row.name, sizeBytes: row.size_bytes })),
        intake: input.intake,
        nTrials: input.nTrials,
      },
      'previewed',
      {
        read: (fileId, offset, length) => objectStore().getRange(keyOf.get(fileId)!, offset, length),
        maxSeconds: MAX_SECONDS,
      },
    );
    return preview;
  } catch (error) {
    if (!(error instanceof ReaderLost)) throw error;
    log.warn({ err: error, sessionId: input.sessionId }, 'a preview was not read to its end');
    return { nTrials: 0, nUnits: 0, nBins: 0, columns: [], totals: [], problems: [lostProblem(error)] };
  } finally {
    running -= 1;
  }
}
