import { db } from '@/db/connection';
import { findReadout } from '@/db/repositories/readouts';
import type { Readout } from '@/lib/contracts/readout';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { toReadout } from '@/lib/services/readouts/to-readout';

/** One readout with its recipe, its result and its record. */
export async function getReadout(ctx: Ctx, input: { readoutId: string }): Promise<Readout> {
  authorize(ctx, 'readout.read');
  const row = await findReadout(db(), ctx.actor.labId, input.readoutId);
  if (row === null) throw notFound();
  return toReadout(row);
}
