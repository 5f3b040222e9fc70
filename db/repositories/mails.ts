import type { Knex } from 'knex';

export type MailKind = 'invitation' | 'password-reset' | 'password-changed';
export interface MailRow {
  id: string;
  kind: MailKind;
  recipient: string;
  payload: { id: string };
  attempts: number;
}

/** Adds a mail in the caller's transaction; it is sent after the commit, and not at all after a rollback. */
export async function addMail(
  trx: Knex.Transaction,
  mail: { id: string; kind: MailKind; recipient: string; payload: { id: string } },
): Promise<void> {
  await trx('mails').insert({
    ...mail,
    payload: JSON.stringify(mail.payload),
    next_at: trx.raw('current_timestamp(3)'),
  });
}

/** Takes up to `limit` mails that are due for `leaseSeconds`; those that another worker is sending are passed over. */
export async function leaseMails(q: Knex, limit: number, leaseSeconds: number): Promise<MailRow[]> {
  return q.transaction(
    async (trx) => {
      const rows = (await trx('mails')
        .select('id', 'kind', 'recipient', 'payload', 'attempts')
        .whereNull('sent_at')
        .whereNull('failed_at')
        .andWhere('next_at', '<=', trx.raw('current_timestamp(3)'))
        .orderBy('id')
        .limit(limit)
        .forUpdate()
        .skipLocked()) as MailRow[];
      if (rows.length > 0)
        await trx('mails')
          .whereIn(
            'id',
            rows.map(({ id }) => id),
          )
          .update({ next_at: trx.raw('timestampadd(second, ?, current_timestamp(3))', [leaseSeconds]) });
      return rows;
    },
    { isolationLevel: 'read committed' },
  );
}

export async function markMailSent(q: Knex, id: string): Promise<void> {
  await q('mails')
    .where({ id })
    .update({ sent_at: q.raw('current_timestamp(3)'), attempts: q.raw('attempts + 1') });
}

/** Puts a mail off: half a minute after the first failure, twice as long each time, an hour at most. */
export async function postponeMail(q: Knex, id: string): Promise<void> {
  await q('mails')
    .where({ id })
    .update({
      attempts: q.raw('attempts + 1'),
      next_at: q.raw(
        'timestampadd(second, least(3600, 30 * pow(2, least(attempts, 10))), current_timestamp(3))',
      ),
    });
}

/** Gives a mail up. */
export async function markMailFailed(q: Knex, id: string): Promise<void> {
  await q('mails')
    .where({ id })
    .update({ failed_at: q.raw('current_timestamp(3)'), attempts: q.raw('attempts + 1') });
}

/** Forgets mails that were sent or given up more than 30 days ago. */
export async function purgeMails(q: Knex): Promise<void> {
  await q('mails')
    .where('created_at', '<', q.raw('timestampadd(day, -30, current_timestamp(3))'))
    .limit(1_000)
    .delete();
}
