import type { Knex } from 'knex';

export interface LabRow {
  id: string;
  name: string;
  is_demo: boolean;
  created_at: Date;
}

export async function insertLab(q: Knex, row: { id: string; name: string; is_demo: boolean }): Promise<void> {
  await q('labs').insert(row);
}

export async function findLab(q: Knex, labId: string): Promise<LabRow | null> {
  const row = await q<LabRow>('labs').where({ id: labId }).first();
  return row ?? null;
}
