import type { Knex } from 'knex';
import type { Scope } from '@/lib/contracts/lab';
import type { MemberRow } from './memberships';

export interface ApiTokenRow {
  id: string;
  lab_id: string;
  user_id: string;
  name: string;
  token_hash: string;
  scopes: Scope[];
  expires_at: Date;
  last_used_at: Date | null;
  revoked_at: Date | null;
  created_at: Date;
}

export async function insertApiToken(
  trx: Knex,
  row: Pick<ApiTokenRow, 'id' | 'lab_id' | 'user_id' | 'name' | 'token_hash' | 'scopes' | 'expires_at'>,
): Promise<void> {
  await trx('api_tokens').insert({ ...row, scopes: JSON.stringify(row.scopes) });
}

/** The live token of this hash with its maker's present membership; a token without a membership does not exist. */
export async function findLiveApiToken(
  q: Knex,
  tokenHash: string,
): Promise<(MemberRow & { token_id: string; scopes: Scope[] }) | null> {
  const row = (await q('api_tokens as t')
    .join('memberships as m', (on) => on.on('m.lab_id', 't.lab_id').andOn('m.user_id', 't.user_id'))
    .join('users as u', 'u.id', 't.user_id')
    .join('labs as l', 'l.id', 't.lab_id')
    .where('t.token_hash', tokenHash)
    .whereNull('t.revoked_at')
    .where('t.expires_at', '>', new Date())
    .first(
      't.id as token_id',
      't.scopes',
      'm.user_id',
      'u.name as user_name',
      'u.email',
      'u.session_epoch',
      'm.lab_id',
      'l.name as lab_name',
      'm.role',
    )) as (MemberRow & { token_id: string; scopes: Scope[] }) | undefined;
  return row ?? null;
}

/** Notes the use of a token, at most once a minute. */
export async function touchApiToken(q: Knex, tokenId: string, now: Date): Promise<void> {
  await q('api_tokens')
    .where({ id: tokenId })
    .andWhere((where) =>
      where.whereNull('last_used_at').orWhere('last_used_at', '<', new Date(now.getTime() - 60_000)),
    )
    .update({ last_used_at: now });
}

/** One member's own tokens, newest first, before the id `beforeId`. */
export async function listApiTokens(
  q: Knex,
  labId: string,
  userId: string,
  beforeId: string | null,
  limit: number,
): Promise<ApiTokenRow[]> {
  const query = q<ApiTokenRow>('api_tokens')
    .where({ lab_id: labId, user_id: userId })
    .orderBy('id', 'desc')
    .limit(limit);
  if (beforeId !== null) void query.where('id', '<', beforeId);
  return query;
}

export async function findApiToken(
  q: Knex,
  labId: string,
  userId: string,
  tokenId: string,
): Promise<ApiTokenRow | null> {
  const row = await q<ApiTokenRow>('api_tokens')
    .where({ lab_id: labId, user_id: userId, id: tokenId })
    .first();
  return row ?? null;
}

/** Revokes a token; false where it was revoked before. */
export async function revokeApiToken(trx: Knex, labId: string, tokenId: string, now: Date): Promise<boolean> {
  const changed = await trx('api_tokens')
    .where({ lab_id: labId, id: tokenId })
    .whereNull('revoked_at')
    .update({ revoked_at: now });
  return changed === 1;
}
