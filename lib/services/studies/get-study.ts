import { db } from '@/db/connection';
import { findStudy } from '@/db/repositories/studies';
import type { Study } from '@/lib/contracts/lab';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { toStudy } from './to-study';

export async function getStudy(ctx: Ctx, input: { studyId: string }): Promise<Study> {
  authorize(ctx, 'study.read');
  const row = await findStudy(db(), ctx.actor.labId, input.studyId);
  if (row === null) throw notFound();
  return toStudy(row);
}
