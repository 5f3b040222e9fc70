import type { Knex } from 'knex';
import type { Role } from '@/lib/contracts/lab';

export interface InvitationRow {
  id: string;
  lab_id: string;
  email: string;
  role: Role;
  invited_by: string;
  expires_at: Date;
  accepted_at: Date | null;
  revoked_at: Date | null;
  created_at: Date;
}

export async function insertInvitation(
  trx: Knex,
  row: Omit<InvitationRow, 'accepted_at' | 'revoked_at'>,
): Promise<void> {
  await trx('invitations').insert(row);
}

function withNames(q: Knex): Knex.QueryBuilder {
  return q('invitations as i')
    .join('users as u', 'u.id', 'i.invited_by')
    .join('labs as l', 'l.id', 'i.lab_id')
    .select('i.*', 'u.name as inviter_name', 'l.name as lab_name');
}

/** Whatever its lab: only for somebody who holds the invitation's own link. */
export async function findInvitationByLink(
  q: Knex,
  invitationId: string,
): Promise<(InvitationRow & { inviter_name: string; lab_name: string }) | null> {
  const row = (await withNames(q).where('i.id', invitationId).first()) as
    (InvitationRow & { inviter_name: string; lab_name: string }) | undefined;
  return row ?? null;
}

export async function findInvitation(
  q: Knex,
  labId: string,
  invitationId: string,
): Promise<InvitationRow | null> {
  const row = await q<InvitationRow>('invitations').where({ lab_id: labId, id: invitationId }).first();
  return row ?? null;
}

/** A lab's invitations, newest first, before the id `beforeId`. */
export async function listInvitationRows(
  q: Knex,
  labId: string,
  beforeId: string | null,
  limit: number,
): Promise<(InvitationRow & { inviter_name: string })[]> {
  const query = withNames(q).where('i.lab_id', labId).orderBy('i.id', 'desc').limit(limit);
  if (beforeId !== null) void query.where('i.id', '<', beforeId);
  return query;
}

/** Marks an open invitation as accepted or revoked; false where it was closed already. */
export async function closeInvitation(
  trx: Knex,
  invitationId: string,
  change: { accepted_at: Date } | { revoked_at: Date },
): Promise<boolean> {
  const changed = await trx('invitations')
    .where({ id: invitationId })
    .whereNull('accepted_at')
    .whereNull('revoked_at')
    .update(change);
  return changed === 1;
}

/** Revokes the open invitations of an address to a lab: a new one takes their place. */
export async function revokeOpenInvitations(
  trx: Knex,
  labId: string,
  email: string,
  now: Date,
): Promise<void> {
  await trx('invitations')
    .where({ lab_id: labId, email })
    .whereNull('accepted_at')
    .whereNull('revoked_at')
    .update({ revoked_at: now });
}
