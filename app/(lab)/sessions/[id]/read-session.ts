import { cache } from 'react';
import { orNotFound } from '@/app/(lab)/or-not-found';
import { readAll } from '@/app/(lab)/read-all';
import { excludedWithReasons } from '@/components/session/excluded-with-reasons';
import { findBlockColumn } from '@/components/session/find-block-column';
import { toSheetColumn, type SheetColumn } from '@/components/session/sheet-column';
import type { UnitRow } from '@/components/session/unit-row';
import { requirePageContext } from '@/lib/auth/page-context';
import type { ExclusionList, Session } from '@/lib/contracts/session';
import { listExclusions } from '@/lib/services/exclusions/list-exclusions';
import { loadTables } from '@/lib/services/intake/load-session-data';
import { listReadouts } from '@/lib/services/readouts/list-readouts';
import { getSession } from '@/lib/services/sessions/get-session';
import { getStudy } from '@/lib/services/studies/get-study';

/** The session by its id, read once a request; another lab's is not found. */
export const readSession = cache(async (sessionId: string): Promise<Session> =>
  orNotFound(getSession(await requirePageContext(), { sessionId })),
);

/** The session's study, exclusions and attempt ledger. */
export async function readSurroundings(session: Session) {
  const ctx = await requirePageContext();
  const [study, exclusions, readouts] = await Promise.all([
    getStudy(ctx, { studyId: session.studyId }),
    listExclusions(ctx, { sessionId: session.id }),
    readAll((cursor) => listReadouts(ctx, { sessionId: session.id, cursor, limit: 200 })),
  ]);
  return { study, exclusions, readouts };
}

/** What the session's tables say, as plain values for the page. */
export interface SheetTables {
  trialColumns: SheetColumn[];
  unitColumns: SheetColumn[];
  block: SheetColumn | null;
  /** Mean rate over the units of each trial, spikes/s. */
  rateHz: (number | null)[];
  /** Mean rate over trials and units of each bin, spikes/s. */
  populationRateHz: number[];
  units: UnitRow[];
}

/** Reads the trial and unit tables of the current data version with what follows from the counts. */
export async function readTables(session: Session, exclusions: ExclusionList): Promise<SheetTables> {
  const ctx = await requirePageContext();
  const { trials, units, derived } = await loadTables(ctx, {
    sessionId: session.id,
    dataVersion: session.dataVersion ?? undefined,
  });
  const trialColumns = trials.map(toSheetColumn);
  const unitColumns = units.map(toSheetColumn);
  const seconds = ((session.bins ?? 1) * (session.binWidthMs ?? 1)) / 1000;
  const finite = (value: number): number | null => (Number.isFinite(value) ? value : null);
  const out = new Map(excludedWithReasons(exclusions, 'unit').map((entry) => [entry.index, entry]));
  return {
    trialColumns,
    unitColumns,
    block: findBlockColumn(trialColumns),
    rateHz: Array.from(derived.trialTotals, (total) => finite(total / seconds / (session.units ?? 1))),
    populationRateHz: Array.from(
      derived.binTotals,
      (total) => total / ((session.trials ?? 1) * (session.units ?? 1) * ((session.binWidthMs ?? 1) / 1000)),
    ),
    units: Array.from(derived.meanRateHz, (rateHz, unit) => {
      const left = out.get(unit);
      return {
        unit,
        rateHz,
        presence: derived.presence[unit],
        fano: finite(derived.fano[unit]),
        values: unitColumns.map((column) => column.values[unit]),
        out: left ? { reason: left.reason, authorName: left.authorName } : null,
      };
    }),
  };
}
