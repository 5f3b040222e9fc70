import { db } from '@/db/connection';
import { listStudyRows } from '@/db/repositories/studies';
import type { Study } from '@/lib/contracts/lab';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import type { PageInput } from '@/lib/services/page-input';
import { pageOfRows } from '@/lib/services/page-of-rows';
import { toStudy } from './to-study';

/** The lab's studies, newest first. */
export async function listStudies(
  ctx: Ctx,
  input: PageInput = {},
): Promise<{ items: Study[]; nextCursor: string | null }> {
  authorize(ctx, 'study.read');
  return pageOfRows(
    input,
    (beforeId, limit) => listStudyRows(db(), ctx.actor.labId, beforeId, limit),
    toStudy,
  );
}
