import type { Knex } from 'knex';

/** Keeps a finished piece of a long readout, so that a later attempt goes on from there. The same piece twice is one. */
export async function saveReadoutPart(
  q: Knex,
  readoutId: string,
  part: string,
  payload: Uint8Array,
): Promise<void> {
  await q('readout_parts')
    .insert({ readout_id: readoutId, part, payload: Buffer.from(payload) })
    .onConflict(['readout_id', 'part'])
    .ignore();
}

/** All pieces that were kept under names that begin with `prefix`. */
export async function listReadoutParts(
  q: Knex,
  readoutId: string,
  prefix: string,
): Promise<{ part: string; payload: Uint8Array }[]> {
  const rows = await q('readout_parts')
    .select('part', 'payload')
    .where({ readout_id: readoutId })
    .andWhereRaw('left(part, ?) = ?', [prefix.length, prefix])
    .orderBy('part');
  return rows.map((row) => ({ part: row.part, payload: row.payload }));
}

export async function removeReadoutParts(q: Knex, readoutId: string): Promise<void> {
  await q('readout_parts').where({ readout_id: readoutId }).delete();
}
