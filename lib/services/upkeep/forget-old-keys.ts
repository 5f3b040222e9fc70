import { db } from '@/db/connection';
import { forgetIdempotencyKeys } from '@/db/repositories/idempotency-keys';

/** A repeated request is told from a new one for this long. */
const keptMs = 48 * 60 * 60 * 1000;

/** Forgets idempotency keys that no client can still be repeating. */
export async function forgetOldKeys(): Promise<void> {
  await forgetIdempotencyKeys(db(), new Date(Date.now() - keptMs));
}
