import type { Column } from '@/lib/intake/column';
import type { SessionTables } from '@/lib/services/readouts/session-tables';

/** Tables of a made-up session: 12 trials, 4 units, 6 bins of 50 ms from −100 ms. */
export function makeTables(change: Partial<SessionTables> = {}): SessionTables {
  const trials: Column[] = [
    { name: 'fraction', type: 'number', values: Float64Array.from({ length: 12 }, (_, t) => (t % 4) / 4) },
    { name: 'speed', type: 'number', values: Float64Array.from({ length: 12 }, (_, t) => 2 + (t % 3)) },
    { name: 'heading', type: 'circular', periodDeg: 360, values: new Float64Array(12).fill(90) },
    { name: 'block', type: 'category', values: Array.from({ length: 12 }, (_, t) => (t < 6 ? 'a' : 'b')) },
  ];
  const units: Column[] = [{ name: 'area', type: 'category', values: ['MT', 'MT', 'V1', 'V1'] }];
  return {
    nTrials: 12,
    nUnits: 4,
    nBins: 6,
    binWidthMs: 50,
    windowStartMs: -100,
    trials,
    units,
    unitFacts: null,
    ...change,
  };
}
