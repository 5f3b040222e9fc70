import { db } from '@/db/connection';
import { listFileRows } from '@/db/repositories/files';
import { findSession } from '@/db/repositories/recording-sessions';
import type { IntakeProposal } from '@/lib/contracts/intake';
import { proposeMapping } from '@/lib/intake/proposal/propose-mapping';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';

const MAX_FILES = 200;

/** A mapping of the session's readable files, as far as their facts settle it, with questions for the rest. */
export async function proposeIntake(ctx: Ctx, input: { sessionId: string }): Promise<IntakeProposal> {
  authorize(ctx, 'file.read');
  const { labId } = ctx.actor;
  if ((await findSession(db(), labId, input.sessionId)) === null) throw notFound();
  const rows = await listFileRows(db(), labId, input.sessionId, null, MAX_FILES);
  return proposeMapping(
    rows
      .filter((row) => row.state === 'readable')
      .reverse()
      .flatMap((row) =>
        row.format === null
          ? []
          : [{ fileId: row.id, name: row.name, format: row.format, arrays: row.arrays }],
      ),
  );
}
