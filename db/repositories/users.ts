import type { Knex } from 'knex';

export interface UserRow {
  id: string;
  email: string;
  name: string;
  password_hash: string;
  session_epoch: number;
  created_at: Date;
}

export async function insertUser(
  q: Knex,
  row: Pick<UserRow, 'id' | 'email' | 'name' | 'password_hash'>,
): Promise<void> {
  await q('users').insert(row);
}

/** By address, in lower case. */
export async function findUserByEmail(q: Knex, email: string): Promise<UserRow | null> {
  const row = await q<UserRow>('users').where({ email }).first();
  return row ?? null;
}

export async function findUser(q: Knex, userId: string): Promise<UserRow | null> {
  const row = await q<UserRow>('users').where({ id: userId }).first();
  return row ?? null;
}

/** Sets a new password; sessions go on. */
export async function setPasswordHash(q: Knex, userId: string, passwordHash: string): Promise<void> {
  await q('users').where({ id: userId }).update({ password_hash: passwordHash });
}

/** Sets a new password and moves the session epoch on: every session signed in before is over. */
export async function changePasswordHash(q: Knex, userId: string, passwordHash: string): Promise<void> {
  await q('users')
    .where({ id: userId })
    .update({ password_hash: passwordHash, session_epoch: q.raw('session_epoch + 1') });
}
