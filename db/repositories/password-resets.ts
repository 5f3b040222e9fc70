import type { Knex } from 'knex';

export interface PasswordResetRow {
  id: string;
  user_id: string;
  expires_at: Date;
  used_at: Date | null;
  created_at: Date;
}

export async function insertPasswordReset(
  trx: Knex,
  row: Pick<PasswordResetRow, 'id' | 'user_id' | 'expires_at'>,
): Promise<void> {
  await trx('password_resets').insert(row);
}

export async function findPasswordReset(q: Knex, resetId: string): Promise<PasswordResetRow | null> {
  const row = await q<PasswordResetRow>('password_resets').where({ id: resetId }).first();
  return row ?? null;
}

/** Uses up all open resets of a person, and says whether the named one was among them and still in time. */
export async function usePasswordResets(
  trx: Knex,
  userId: string,
  resetId: string,
  now: Date,
): Promise<boolean> {
  const used = await trx('password_resets')
    .where({ id: resetId, user_id: userId })
    .whereNull('used_at')
    .where('expires_at', '>', now)
    .update({ used_at: now });
  await trx('password_resets').where({ user_id: userId }).whereNull('used_at').update({ used_at: now });
  return used === 1;
}
