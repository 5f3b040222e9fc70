import { v7 } from 'uuid';
import { hasOpenIntake, insertIntake, setSessionState } from '@/db/repositories/intakes';
import { addToOutbox } from '@/db/repositories/outbox';
import { lockSession } from '@/db/repositories/recording-sessions';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { Intake } from '@/lib/contracts/intake';
import type { IntakeStarted } from '@/lib/contracts/intake-answer';
import { AppError } from '@/lib/errors/app-error';
import { publishLive } from '@/lib/jobs/publish-live';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { mappedFiles } from '@/lib/services/intake/mapped-files';
import { notFound } from '@/lib/services/not-found';
import { pokeRelay } from '@/lib/services/outbox/poke-relay';

/**
 * Has the worker read and check a session's files as the mapping says. The session is “checking” from here, then ready,
 * waiting (warnings that were not accepted) or refused. A session that has data gets a new version of them.
 */
export async function submitIntake(ctx: Ctx, input: Intake & { sessionId: string }): Promise<IntakeStarted> {
  authorize(ctx, 'intake.submit');
  const { labId, userId } = ctx.actor;
  const { sessionId, ...mapping } = input;
  const intakeId = v7();
  await inTransaction(async (trx) => {
    if (!(await lockSession(trx, labId, sessionId))) throw notFound();
    if (await hasOpenIntake(trx, sessionId))
      throw new AppError('conflict', 'An intake of this session is still being checked. Wait for its end.');
    const files = await mappedFiles(trx, labId, sessionId, mapping);
    await insertIntake(trx, {
      id: intakeId,
      lab_id: labId,
      session_id: sessionId,
      mapping,
      created_by: userId,
    });
    await setSessionState(trx, sessionId, 'checking', []);
    await addToOutbox(trx, { kind: 'run-intake', payload: { id: intakeId } });
    await writeAudit(trx, ctx, {
      action: 'intake.submit',
      subjectKind: 'session',
      subjectId: sessionId,
      detail: {
        intakeId,
        acceptWarnings: mapping.acceptWarnings,
        files: files.map((file) => ({ id: file.id, name: file.name, sha256: file.sha256 })),
      },
    });
  });
  pokeRelay();
  await publishLive({ labId, kind: 'session', sessionId, state: 'checking' });
  return { intakeId, state: 'checking' };
}
