import { db } from '@/db/connection';
import { findReadout } from '@/db/repositories/readouts';
import { AppError } from '@/lib/errors/app-error';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import { objectStore } from '@/storage/object-store';

/** The held-out predictions as they are kept (an Arrow IPC stream), with the number of their readout. */
export async function loadPredictions(
  ctx: Ctx,
  input: { readoutId: string },
): Promise<{ bytes: Uint8Array; number: number }> {
  authorize(ctx, 'readout.read');
  const row = await findReadout(db(), ctx.actor.labId, input.readoutId);
  if (row === null) throw notFound();
  if (row.predictionsKey === null)
    throw new AppError('conflict', `This readout is ${row.state}; predictions are there once it is done.`);
  return { bytes: await objectStore().getBytes(row.predictionsKey), number: row.number };
}
