import { readColumns } from '@/lib/intake/canonical/read-columns';
import { readPart } from '@/lib/intake/canonical/read-part';
import type { PartSource } from '@/lib/intake/canonical/part-source';
import type { SessionTables } from '@/lib/services/readouts/session-tables';

type Shape = Pick<SessionTables, 'nTrials' | 'nUnits' | 'nBins' | 'binWidthMs' | 'windowStartMs'>;

/** The trial and unit tables of a data version; the units' rates, which need the counts, are left open. */
export async function loadSessionTables(source: PartSource, shape: Shape): Promise<SessionTables> {
  const [trials, units] = await Promise.all([readPart(source, 'trials'), readPart(source, 'units')]);
  if (!trials || !units) throw new Error('the data version lacks a table');
  const { nTrials, nUnits, nBins, binWidthMs, windowStartMs } = shape;
  return {
    nTrials,
    nUnits,
    nBins,
    binWidthMs,
    windowStartMs,
    trials: readColumns(trials),
    units: readColumns(units),
    unitFacts: null,
  };
}
