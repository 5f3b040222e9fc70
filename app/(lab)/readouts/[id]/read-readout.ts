import { cache } from 'react';
import { orNotFound } from '@/app/(lab)/or-not-found';
import { readAll } from '@/app/(lab)/read-all';
import { requirePageContext } from '@/lib/auth/page-context';
import { listExclusions } from '@/lib/services/exclusions/list-exclusions';
import { loadTables } from '@/lib/services/intake/load-session-data';
import { getReadout } from '@/lib/services/readouts/get-readout';
import { listPredictions } from '@/lib/services/readouts/list-predictions';
import { listReadouts } from '@/lib/services/readouts/list-readouts';
import { getSession } from '@/lib/services/sessions/get-session';
import { getStudy } from '@/lib/services/studies/get-study';
import { toSheetColumn } from '@/components/session/sheet-column';

/** The readout by its id, read once a request; another lab's is not found. */
export const readReadout = cache(async (readoutId: string) =>
  orNotFound(getReadout(await requirePageContext(), { readoutId })),
);

/** Where the readout stands: its session, study, and the number of the session's newest readout. */
export async function readPlace(sessionId: string) {
  const ctx = await requirePageContext();
  const [session, newest] = await Promise.all([
    getSession(ctx, { sessionId }),
    listReadouts(ctx, { sessionId, limit: 1 }),
  ]);
  const study = await getStudy(ctx, { studyId: session.studyId });
  return { session, study, newestNumber: newest.items[0]?.number ?? 1 };
}

/** What the drawings of a finished readout need: predictions, the trial table it used, exclusions as they were then. */
export async function readDrawings(
  readoutId: string,
  sessionId: string,
  dataVersion: number,
  exclusionsVersion: number | null,
) {
  const ctx = await requirePageContext();
  const [predictions, tables, exclusions] = await Promise.all([
    readAll((cursor) => listPredictions(ctx, { readoutId, cursor, limit: 5000 }), 20_000),
    loadTables(ctx, { sessionId, dataVersion }),
    exclusionsVersion === null ? null : listExclusions(ctx, { sessionId, version: exclusionsVersion }),
  ]);
  return {
    predictions: predictions.items,
    trialColumns: tables.trials.map(toSheetColumn),
    exclusions,
  };
}
