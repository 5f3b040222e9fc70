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

/** A lab's members, the oldest membership first. */
export async function listLabMembers(q: Knex, labId: string): Promise<(MemberRow & { joined_at: Date })[]> {
  return members(q)
    .select('m.created_at as joined_at')
    .where({ 'm.lab_id': labId })
    .orderBy(['m.created_at', 'm.user_id']);
}

/** Locks the lab's leads, and gives how many there are: a lab must keep one. */
export async function countLeadsLocked(trx: Knex.Transaction, labId: string): Promise<number> {
  const rows = await trx('memberships').where({ lab_id: labId, role: 'lead' }).forUpdate().select('user_id');
  return rows.length;
}

export async function changeMembershipRole(
  trx: Knex,
  labId: string,
  userId: string,
  role: Role,
): Promise<void> {
  await trx('memberships').where({ lab_id: labId, user_id: userId }).update({ role });
}

/** Ends a membership; the member's tokens in this lab go with it. */
export async function deleteMembership(trx: Knex, labId: string, userId: string): Promise<void> {
  await trx('memberships').where({ lab_id: labId, user_id: userId }).delete();
}
