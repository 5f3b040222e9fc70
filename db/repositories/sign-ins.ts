import type { Knex } from 'knex';
import type { MemberRow } from './memberships';

export interface SignInRow {
  id: string;
  user_id: string;
  /** The lab that the session looks at. */
  lab_id: string | null;
  agent: string;
  address: string;
  last_seen_at: Date;
  ended_at: Date | null;
  created_at: Date;
}

export async function insertSignIn(
  q: Knex,
  row: Pick<SignInRow, 'id' | 'user_id' | 'lab_id' | 'agent' | 'address' | 'last_seen_at'>,
): Promise<void> {
  await q('sign_ins').insert(row);
}

/** The member behind a browser session that has neither ended nor been idle since `idleSince`. */
export async function findSignedInMember(
  q: Knex,
  key: { signInId: string; userId: string; idleSince: Date },
): Promise<(MemberRow & { last_seen_at: Date }) | null> {
  const row = (await q('sign_ins as s')
    .join('users as u', 'u.id', 's.user_id')
    .join('memberships as m', (on) => on.on('m.user_id', 's.user_id').andOn('m.lab_id', 's.lab_id'))
    .join('labs as l', 'l.id', 'm.lab_id')
    .where({ 's.id': key.signInId, 's.user_id': key.userId })
    .whereNull('s.ended_at')
    .where('s.last_seen_at', '>', key.idleSince)
    .first(
      's.last_seen_at',
      'm.user_id',
      'u.name as user_name',
      'u.email',
      'u.session_epoch',
      'm.lab_id',
      'l.name as lab_name',
      'm.role',
    )) as (MemberRow & { last_seen_at: Date }) | undefined;
  return row ?? null;
}

export async function touchSignIn(q: Knex, signInId: string, now: Date): Promise<void> {
  await q('sign_ins').where({ id: signInId }).update({ last_seen_at: now });
}

/** A person's sessions that have not ended or gone idle, newest first. */
export async function listLiveSignIns(q: Knex, userId: string, idleSince: Date): Promise<SignInRow[]> {
  return q<SignInRow>('sign_ins')
    .where({ user_id: userId })
    .whereNull('ended_at')
    .where('last_seen_at', '>', idleSince)
    .orderBy('id', 'desc')
    .limit(200);
}

/** Ends one session of a person; false where there is none that is still open. */
export async function endSignIn(q: Knex, userId: string, signInId: string, now: Date): Promise<boolean> {
  const changed = await q('sign_ins')
    .where({ id: signInId, user_id: userId })
    .whereNull('ended_at')
    .update({ ended_at: now });
  return changed === 1;
}

/** Ends all sessions of a person but `exceptId`. */
export async function endOtherSignIns(
  q: Knex,
  userId: string,
  exceptId: string | null,
  now: Date,
): Promise<number> {
  const query = q('sign_ins').where({ user_id: userId }).whereNull('ended_at');
  if (exceptId !== null) void query.whereNot({ id: exceptId });
  return query.update({ ended_at: now });
}
