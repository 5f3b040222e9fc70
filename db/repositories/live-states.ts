import type { Knex } from 'knex';
import type { LiveEvent } from '@/lib/contracts/readout';
import { listReadoutStates } from '@/db/repositories/readouts';

/** Where a session, its files and its readouts stand now, as the events that would have led there. */
export async function listLiveStates(q: Knex, labId: string, sessionId: string): Promise<LiveEvent[]> {
  const session = await q('recording_sessions')
    .select('state')
    .where({ id: sessionId, lab_id: labId })
    .first();
  if (!session) return [];
  const files = await q('files')
    .select('id', 'state')
    .where({ session_id: sessionId, lab_id: labId })
    .orderBy('id', 'desc')
    .limit(200);
  const readouts = await listReadoutStates(q, labId, sessionId);
  return [
    { kind: 'session', sessionId, state: session.state },
    ...files.map((file) => ({ kind: 'file' as const, sessionId, fileId: file.id, state: file.state })),
    ...readouts.map(({ id, state, progress }) => ({
      kind: 'readout' as const,
      sessionId,
      readoutId: id,
      state,
      progress,
    })),
  ];
}
