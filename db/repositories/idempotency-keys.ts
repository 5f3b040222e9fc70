import type { Knex } from 'knex';

export interface IdempotencyRow {
  user_id: string;
  idempotency_key: string;
  route: string;
  request_hash: string;
  /** null while the first request is still being carried out. */
  status: number | null;
  response: string | null;
  created_at: Date;
}

/** Claims a key for a request. True where it was free; false where it is taken. */
export async function claimIdempotencyKey(
  q: Knex,
  row: Pick<IdempotencyRow, 'user_id' | 'idempotency_key' | 'route' | 'request_hash'>,
): Promise<boolean> {
  const [result] = await q.raw<[{ affectedRows: number }]>(
    'insert ignore into idempotency_keys (user_id, idempotency_key, route, request_hash) values (?, ?, ?, ?)',
    [row.user_id, row.idempotency_key, row.route, row.request_hash],
  );
  return result.affectedRows === 1;
}

export async function findIdempotencyKey(
  q: Knex,
  userId: string,
  key: string,
): Promise<IdempotencyRow | null> {
  const row = await q<IdempotencyRow>('idempotency_keys')
    .where({ user_id: userId, idempotency_key: key })
    .first();
  return row ?? null;
}

/** Keeps the answer for replays. */
export async function storeIdempotentAnswer(
  q: Knex,
  userId: string,
  key: string,
  status: number,
  response: string,
): Promise<void> {
  await q('idempotency_keys').where({ user_id: userId, idempotency_key: key }).update({ status, response });
}

/** Frees a key whose request did not change anything. */
export async function releaseIdempotencyKey(q: Knex, userId: string, key: string): Promise<void> {
  await q('idempotency_keys').where({ user_id: userId, idempotency_key: key }).delete();
}

/** Forgets keys from before `before`. */
export async function forgetIdempotencyKeys(q: Knex, before: Date): Promise<number> {
  return q('idempotency_keys').where('created_at', '<', before).delete();
}
