import { db } from '@/db/connection';
import { purgeOutbox } from '@/db/repositories/outbox';

/** Forgets outbox entries that were sent long ago. */
export async function forgetSent(): Promise<void> {
  await purgeOutbox(db());
}
