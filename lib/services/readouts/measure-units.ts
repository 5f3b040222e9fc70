import type { SessionTables } from '@/lib/services/readouts/session-tables';

/**
 * Each unit's mean rate (spikes/s) and the share of trials with at least one spike, over all trials and bins.
 * @param counts nTrials × nUnits × nBins, row-major
 */
export function measureUnits(
  counts: ArrayLike<number>,
  shape: { nTrials: number; nUnits: number; nBins: number; binWidthMs: number },
): NonNullable<SessionTables['unitFacts']> {
  const { nTrials, nUnits, nBins, binWidthMs } = shape;
  const meanRateHz = new Float64Array(nUnits);
  const presence = new Float64Array(nUnits);
  for (let trial = 0; trial < nTrials; trial++)
    for (let unit = 0; unit < nUnits; unit++) {
      const from = (trial * nUnits + unit) * nBins;
      let spikes = 0;
      for (let at = from; at < from + nBins; at++) spikes += counts[at];
      meanRateHz[unit] += spikes;
      if (spikes > 0) presence[unit] += 1;
    }
  const seconds = (nTrials * nBins * binWidthMs) / 1_000;
  return { meanRateHz: meanRateHz.map((n) => n / seconds), presence: presence.map((n) => n / nTrials) };
}
