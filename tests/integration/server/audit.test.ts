import { v7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { db } from '@/db/connection';
import { inTransaction } from '@/db/transaction';
import { verifyAuditChain } from '@/lib/audit/verify-audit-chain';
import { writeAudit } from '@/lib/audit/write-audit';
import { createStudy } from '@/lib/services/studies/create-study';
import { insertLab, type LabRows } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';
import { actorOf } from './support';

let drop: () => Promise<void>;
beforeAll(async () => {
  drop = await freshDatabase();
});
afterAll(() => drop());

async function labWithEntries(n: number): Promise<LabRows> {
  const lab = await insertLab();
  const ctx = { actor: actorOf(lab), requestId: v7() };
  for (let i = 0; i < n; i++)
    await inTransaction((trx) =>
      writeAudit(trx, ctx, {
        action: 'study.create',
        subjectKind: 'study',
        subjectId: v7(),
        detail: { z: i / 3, a: ['ä', null, { nested: true }], name: 'emoji 🐭 and "quotes"' },
      }),
    );
  return lab;
}

describe('the audit chain', () => {
  it('stays linear and whole under parallel writers of several labs', async () => {
    const labs = [await insertLab(), await insertLab()];
    await Promise.all(
      Array.from({ length: 120 }, (_, i) => {
        const lab = labs[i % 2];
        return createStudy({ actor: actorOf(lab), requestId: v7() }, { name: `Study ${i}`, question: '' });
      }),
    );
    for (const { labId } of labs)
      expect(await verifyAuditChain(labId)).toMatchObject({ entries: 60, faults: [] });
  });

  it('leaves nothing behind when the transaction fails', async () => {
    const lab = await labWithEntries(2);
    const ctx = { actor: actorOf(lab), requestId: v7() };
    await expect(
      inTransaction(async (trx) => {
        await writeAudit(trx, ctx, { action: 'x.y', subjectKind: 'x', subjectId: '1' });
        throw new Error('the change failed');
      }),
    ).rejects.toThrow('the change failed');
    expect(await verifyAuditChain(lab.labId)).toMatchObject({ entries: 2, faults: [] });
  });

  it.each([
    [
      'a changed detail',
      (id: number) => db()('audit_entries').where({ id }).update({ detail: '{"z":9}' }),
      'does not fit its hash',
    ],
    [
      'a changed author',
      (id: number) => db()('audit_entries').where({ id }).update({ actor_id: v7() }),
      'does not fit its hash',
    ],
    [
      'a changed time',
      (id: number) =>
        db()('audit_entries')
          .where({ id })
          .update({ created_at: new Date(0) }),
      'does not fit its hash',
    ],
    ['a row taken out', (id: number) => db()('audit_entries').where({ id }).delete(), 'does not follow'],
  ])('shows %s', async (_what, tamper, words) => {
    const lab = await labWithEntries(4);
    const rows = await db()<{ id: number }>('audit_entries').where('lab_id', lab.labId).orderBy('id');
    await tamper(rows[1].id);
    const { faults } = await verifyAuditChain(lab.labId);
    expect(faults.map(({ message }) => message).join()).toContain(words);
  });

  it('shows a tail that was cut off, and a whole chain that was taken away', async () => {
    const lab = await labWithEntries(4);
    const rows = await db()<{ id: number }>('audit_entries').where('lab_id', lab.labId).orderBy('id');
    await db()('audit_entries').where({ id: rows[3].id }).delete();
    expect((await verifyAuditChain(lab.labId)).faults.at(-1)?.message).toContain('end');
    await db()('audit_entries').where('lab_id', lab.labId).delete();
    expect((await verifyAuditChain(lab.labId)).faults).not.toHaveLength(0);
  });
});
