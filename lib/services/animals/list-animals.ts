import { db } from '@/db/connection';
import { listAnimalRows } from '@/db/repositories/animals';
import { findStudy } from '@/db/repositories/studies';
import type { Animal } from '@/lib/contracts/lab';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import type { PageInput } from '@/lib/services/page-input';
import { pageOfRows } from '@/lib/services/page-of-rows';
import { toAnimal } from './to-animal';

/** A study's animals, or all of the lab's, newest first. */
export async function listAnimals(
  ctx: Ctx,
  input: PageInput & { studyId?: string },
): Promise<{ items: Animal[]; nextCursor: string | null }> {
  authorize(ctx, 'animal.read');
  const studyId = input.studyId ?? null;
  if (studyId !== null && (await findStudy(db(), ctx.actor.labId, studyId)) === null) throw notFound();
  return pageOfRows(
    input,
    (beforeId, limit) => listAnimalRows(db(), ctx.actor.labId, studyId, beforeId, limit),
    toAnimal,
  );
}
