import { v7 } from 'uuid';
import { findAnimal } from '@/db/repositories/animals';
import { findSession, insertRecordingSession } from '@/db/repositories/recording-sessions';
import { findStudy } from '@/db/repositories/studies';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import type { CreateSession, Session } from '@/lib/contracts/session';
import { AppError } from '@/lib/errors/app-error';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { requireDateInRange } from '@/lib/services/require-date-in-range';
import { toSession } from './to-session';

/** A new recording session, empty until files are brought in. The animal must belong to the study. */
export async function createSession(ctx: Ctx, input: CreateSession): Promise<Session> {
  authorize(ctx, 'session.create');
  const { labId, userId } = ctx.actor;
  const row = {
    id: v7(),
    lab_id: labId,
    study_id: input.studyId,
    animal_id: input.animalId,
    name: input.name,
    started_at: requireDateInRange(input.startedAt, '/startedAt'),
    created_by: userId,
    created_at: new Date(),
  };
  return inTransaction(async (trx) => {
    const study = await findStudy(trx, labId, input.studyId);
    const animal = await findAnimal(trx, labId, input.animalId);
    if (study === null || animal === null) throw notFound();
    if (animal.study_id !== study.id)
      throw new AppError('invalid-input', 'The animal belongs to another study.', {
        faults: [
          { pointer: '/animalId', code: 'other-study', detail: 'this animal belongs to another study' },
        ],
      });
    await insertRecordingSession(trx, row);
    await writeAudit(trx, ctx, {
      action: 'session.create',
      subjectKind: 'session',
      subjectId: row.id,
      detail: { studyId: study.id, animalId: animal.id, name: row.name },
    });
    const made = await findSession(trx, labId, row.id);
    if (made === null) throw new Error('a session that was just made is missing');
    return toSession(made);
  });
}
