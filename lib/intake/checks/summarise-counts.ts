import type { SessionData } from '@/lib/intake/session-data';

/** Totals and extremes of a session's counts in one pass. */
export function summarise(data: Pick<SessionData, 'counts' | 'nTrials' | 'nUnits' | 'nBins'>): {
  trialTotals: Float64Array;
  unitTotals: Float64Array;
  largest: number;
  largestCell: number;
  /** 1 where a unit's bins are the same in every trial. */
  isConstant: Uint8Array;
} {
  const { counts, nTrials, nUnits, nBins } = data;
  const trialTotals = new Float64Array(nTrials);
  const unitTotals = new Float64Array(nUnits);
  const isConstant = new Uint8Array(nUnits).fill(1);
  let largest = -1;
  let largestCell = 0;
  let cell = 0;
  for (let trial = 0; trial < nTrials; trial++) {
    let trialTotal = 0;
    for (let unit = 0; unit < nUnits; unit++) {
      let total = 0;
      let same = isConstant[unit] === 1;
      const firstTrial = unit * nBins;
      for (let bin = 0; bin < nBins; bin++, cell++) {
        const count = counts[cell];
        total += count;
        if (same && count !== counts[firstTrial + bin]) same = false;
        if (count > largest) {
          largest = count;
          largestCell = cell;
        }
      }
      if (!same) isConstant[unit] = 0;
      unitTotals[unit] += total;
      trialTotal += total;
    }
    trialTotals[trial] = trialTotal;
  }
  return { trialTotals, unitTotals, largest, largestCell, isConstant };
}
