import type { SessionData } from '@/lib/intake/session-data';

/** Facts that follow from the counts, over all trials and bins: for sheets, plots and unit rules. */
export interface DerivedFacts {
  /** Spikes in each trial, all units and bins. */
  trialTotals: Float64Array;
  /** Spikes in each bin, all trials and units. */
  binTotals: Float64Array;
  /** Spikes per second of each unit. */
  meanRateHz: Float64Array;
  /** Share of trials in which the unit spikes at least once, 0 … 1. */
  presence: Float64Array;
  /** Variance (n − 1) over mean of the unit's count per trial; NaN for a silent unit or a single trial. */
  fano: Float64Array;
}

/** One pass over the counts, O(trials × units × bins). */
export function deriveFacts(
  data: Pick<SessionData, 'counts' | 'nTrials' | 'nUnits' | 'nBins' | 'binWidthMs'>,
): DerivedFacts {
  const { counts, nTrials, nUnits, nBins, binWidthMs } = data;
  const trialTotals = new Float64Array(nTrials);
  const binTotals = new Float64Array(nBins);
  const sums = new Float64Array(nUnits);
  const squares = new Float64Array(nUnits);
  const present = new Float64Array(nUnits);
  let cell = 0;
  for (let trial = 0; trial < nTrials; trial++)
    for (let unit = 0; unit < nUnits; unit++) {
      let total = 0;
      for (let bin = 0; bin < nBins; bin++) {
        const count = counts[cell++];
        total += count;
        binTotals[bin] += count;
      }
      trialTotals[trial] += total;
      sums[unit] += total;
      squares[unit] += total * total;
      if (total > 0) present[unit] += 1;
    }
  const seconds = (nTrials * nBins * binWidthMs) / 1000;
  return {
    trialTotals,
    binTotals,
    meanRateHz: sums.map((sum) => sum / seconds),
    presence: present.map((n) => n / nTrials),
    // Counts are whole numbers, so the sums are exact and the difference loses nothing that matters.
    fano: sums.map((sum, unit) => {
      const mean = sum / nTrials;
      return mean > 0 && nTrials > 1 ? (squares[unit] - nTrials * mean * mean) / (nTrials - 1) / mean : NaN;
    }),
  };
}
