import type { ReadoutResult } from '@/lib/contracts/readout';
import { formatCount } from '@/lib/format/format-count';
import { formatNumber } from '@/lib/format/format-number';
import { formatValue } from '@/lib/format/format-value';

/** The line of facts under a verdict. */
export function readoutFacts(result: ReadoutResult): { term: string; value: string }[] {
  const { heldOut, counts, penalty } = result;
  const chosen = penalty.filter((value) => value !== null);
  const low = Math.min(...chosen);
  const high = Math.max(...chosen);
  return [
    { term: 'Pearson r', value: formatNumber(heldOut.r) },
    { term: 'Spearman ρ', value: formatNumber(heldOut.rho) },
    { term: 'RMSE', value: formatNumber(heldOut.rmse, 3) },
    { term: 'MAE', value: formatNumber(heldOut.mae, 3) },
    {
      term: 'calibration slope, intercept',
      value: `${formatNumber(heldOut.calibrationSlope)}, ${formatNumber(heldOut.calibrationIntercept)}`,
    },
    { term: 'trials', value: `${formatCount(counts.trialsUsed)} of ${formatCount(counts.trialsAll)}` },
    {
      term: 'count as',
      value: heldOut.effectiveTrials === null ? '' : `about ${formatNumber(heldOut.effectiveTrials, 0)}`,
    },
    { term: 'units', value: `${formatCount(counts.unitsUsed)} of ${formatCount(counts.unitsAll)}` },
    {
      term: 'penalty',
      value:
        chosen.length === 0
          ? ''
          : low === high
            ? formatValue(low, 3)
            : `${formatValue(low, 3)} to ${formatValue(high, 3)}`,
    },
  ];
}
