import { db } from '@/db/connection';
import { findAnimal } from '@/db/repositories/animals';
import type { Animal } from '@/lib/contracts/lab';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { toAnimal } from './to-animal';

export async function getAnimal(ctx: Ctx, input: { animalId: string }): Promise<Animal> {
  authorize(ctx, 'animal.read');
  const row = await findAnimal(db(), ctx.actor.labId, input.animalId);
  if (row === null) throw notFound();
  return toAnimal(row);
}
