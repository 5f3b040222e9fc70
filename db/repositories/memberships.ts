import type { Knex } from 'knex';
import type { Role } from '@/lib/contracts/lab';

/** A member of a lab with what an actor needs to be told from. */
export interface MemberRow {
  user_id: string;
  user_name: string;
  email: string;
  session_epoch: number;
  lab_id: string;
  lab_name: string;
  role: Role;
}

export async function insertMembership(
  q: Knex,
  row: { lab_id: string; user_id: string; role: Role },
): Promise<void> {
  await q('memberships').insert(row);
}

function members(q: Knex): Knex.QueryBuilder {
  return q('memberships as m')
    .join('users as u', 'u.id', 'm.user_id')
    .join('labs as l', 'l.id', 'm.lab_id')
    .select(
      'm.user_id',
      'u.name as user_name',
      'u.email',
      'u.session_epoch',
      'm.lab_id',
      'l.name as lab_name',
      'm.role',
    );
}

export async function findMember(q: Knex, labId: string, userId: string): Promise<MemberRow | null> {
  const row = (await members(q).where({ 'm.lab_id': labId, 'm.user_id': userId }).first()) as
    MemberRow | undefined;
  return row ?? null;
}

/** The labs that a person belongs to, the oldest membership first. */
export async function listMemberships(q: Knex, userId: string): Promise<MemberRow[]> {
  return members(q).where({ 'm.user_id': userId }).orderBy(['m.created_at', 'm.lab_id']);
}
