import { cache } from 'react';
import { orNotFound } from '@/app/(lab)/or-not-found';
import { readAll } from '@/app/(lab)/read-all';
import type { ForestGroup, ForestRow } from '@/components/study/forest-row';
import { requirePageContext } from '@/lib/auth/page-context';
import type { Problem } from '@/lib/contracts/problem';
import type { ReadoutSummary } from '@/lib/contracts/readout';
import { listAnimals } from '@/lib/services/animals/list-animals';
import { listReadouts } from '@/lib/services/readouts/list-readouts';
import { listSessions } from '@/lib/services/sessions/list-sessions';
import { getStudy } from '@/lib/services/studies/get-study';

/** The newest finished readout of each label; the list comes newest first. */
function newestOfEachLabel(readouts: readonly ReadoutSummary[]): ReadoutSummary[] {
  const byLabel = new Map<string, ReadoutSummary>();
  for (const readout of readouts)
    if (readout.state === 'done' && !byLabel.has(readout.label)) byLabel.set(readout.label, readout);
  return [...byLabel.values()];
}

/** The study by its id, read once a request; another lab's is not found. */
export const readStudy = cache(async (studyId: string) =>
  orNotFound(getStudy(await requirePageContext(), { studyId })),
);

/** All that the study's page shows: animals with their sessions, and each session's newest readouts. */
export async function readStudyRows(
  studyId: string,
): Promise<{ groups: ForestGroup[]; rows: (ForestRow & { problems: readonly Problem[] })[] }> {
  const ctx = await requirePageContext();
  const [animals, sessions] = await Promise.all([
    readAll((cursor) => listAnimals(ctx, { studyId, cursor, limit: 200 })),
    readAll((cursor) => listSessions(ctx, { studyId, cursor, limit: 200 })),
  ]);
  const rows = await Promise.all(
    sessions.items.map(async (session) => {
      const { items } = await listReadouts(ctx, { sessionId: session.id, limit: 200 });
      return {
        animalId: session.animalId,
        sessionId: session.id,
        name: session.name,
        startedAt: session.startedAt,
        state: session.state,
        units: session.units,
        trials: session.trials,
        problems: session.problems,
        // numbers run from 1 within a session and the list comes newest first
        nReadouts: items[0]?.number ?? 0,
        readouts: newestOfEachLabel(items),
      };
    }),
  );
  const sorted = [...animals.items].sort((a, b) => a.code.localeCompare(b.code));
  const groups = sorted.map((animal, index) => ({
    animal,
    index,
    rows: rows
      .filter((row) => row.animalId === animal.id)
      .map(({ animalId: _animal, problems: _problems, ...row }) => row),
  }));
  return { groups, rows };
}
