import { createHash } from 'node:crypto';
import type { Problem } from '@/lib/contracts/problem';
import { summarise } from '@/lib/intake/checks/summarise-counts';
import type { SessionData } from '@/lib/intake/session-data';

const typeMaximum: Readonly<Record<string, number>> = {
  int8: 127,
  uint8: 255,
  int16: 32_767,
  uint16: 65_535,
};
const FASTEST_HZ = 2000;
const MIN_SPIKES = 5;

/** Silent, constant and duplicated units; duplicated, silent and outlying trials; saturated and impossible counts. */
export function checkCounts(data: SessionData, arrayType: string | null): Problem[] {
  const { counts, nTrials, nUnits, nBins } = data;
  const problems: Problem[] = [];
  const { trialTotals, unitTotals, largest, largestCell, isConstant } = summarise(data);
  const cellPlace = (cell: number): Problem['place'] => ({
    trial: Math.floor(cell / (nUnits * nBins)),
    unit: Math.floor(cell / nBins) % nUnits,
    bin: cell % nBins,
  });
  const maximum = arrayType === null ? undefined : typeMaximum[arrayType];
  if (maximum !== undefined && largest === maximum)
    problems.push({
      code: 'counts-saturated',
      severity: 'warns',
      message: `A count reaches ${maximum}, the most that the file’s type ${arrayType} can hold, so larger counts may have been cut off.`,
      remedy: 'Export the counts with a wider type.',
      place: cellPlace(largestCell),
    });
  const rateHz = largest / (data.binWidthMs / 1000);
  if (rateHz > FASTEST_HZ)
    problems.push({
      code: 'counts-fast',
      severity: 'warns',
      message: `A bin holds ${largest} spikes in ${data.binWidthMs} ms, ${Math.round(rateHz)} spikes/s: no neuron fires so fast.`,
      remedy: 'Check the bin width, and that the array holds counts of single units.',
      place: cellPlace(largestCell),
    });

  const silent = indicesWhere(unitTotals, (total) => total === 0);
  if (silent.length === nUnits) {
    problems.push({
      code: 'counts-all-zero',
      severity: 'stops',
      message: 'There is not one spike in the session.',
      remedy: 'Check which array holds the counts.',
      place: {},
    });
    return problems;
  }
  if (silent.length > 0)
    problems.push({
      code: 'unit-silent',
      severity: 'notes',
      message: `${plural(silent.length, 'unit')} of ${nUnits} never spike${silent.length === 1 ? 's' : ''}; the first is given.`,
      remedy: 'Units without variance are dropped in each fold, and counted.',
      place: { unit: silent[0] },
    });
  const constant = indicesWhere(unitTotals, (total, unit) => total > 0 && isConstant[unit] === 1);
  if (constant.length > 0 && nTrials > 1)
    problems.push({
      code: 'unit-constant',
      severity: 'warns',
      message: `${plural(constant.length, 'unit')} of ${nUnits} ${constant.length === 1 ? 'has' : 'have'} the same counts in every trial; the first is given.`,
      remedy: 'Check that these are recorded units.',
      place: { unit: constant[0] },
    });

  const sameUnit = firstDuplicate(
    nUnits,
    (unit) => unitTotals[unit] >= MIN_SPIKES,
    (unit) => {
      const hash = createHash('sha1');
      const own = new Int32Array(nTrials * nBins);
      for (let trial = 0, to = 0; trial < nTrials; trial++) {
        const from = (trial * nUnits + unit) * nBins;
        for (let bin = 0; bin < nBins; bin++) own[to++] = counts[from + bin];
      }
      return hash.update(new Uint8Array(own.buffer)).digest('base64');
    },
  );
  if (sameUnit)
    problems.push({
      code: 'unit-duplicate',
      severity: 'warns',
      message: `${plural(sameUnit.times, 'unit')} ${sameUnit.times === 1 ? 'has' : 'have'} exactly the counts of another unit in all trials and bins; the first is given.`,
      remedy: 'Check that no unit was exported twice.',
      place: { unit: sameUnit.first },
    });

  const rowBytes = nUnits * nBins * counts.BYTES_PER_ELEMENT;
  const bytes = new Uint8Array(counts.buffer, counts.byteOffset, counts.byteLength);
  const sameTrial = firstDuplicate(
    nTrials,
    (trial) => trialTotals[trial] >= MIN_SPIKES,
    (trial) =>
      createHash('sha1')
        .update(bytes.subarray(trial * rowBytes, (trial + 1) * rowBytes))
        .digest('base64'),
  );
  if (sameTrial)
    problems.push({
      code: 'trial-duplicate',
      severity: 'warns',
      message: `${plural(sameTrial.times, 'trial')} ${sameTrial.times === 1 ? 'has' : 'have'} exactly the counts of another trial; the first is given.`,
      remedy:
        'Remove the copies: with one in the training trials and one held out, the readout would be measured on what it was fitted on.',
      place: { trial: sameTrial.first },
    });

  const quiet = indicesWhere(trialTotals, (total) => total === 0);
  if (quiet.length > 0)
    problems.push({
      code: 'trial-silent',
      severity: 'warns',
      message: `${plural(quiet.length, 'trial')} of ${nTrials} ${quiet.length === 1 ? 'has' : 'have'} not one spike; the first is given.`,
      remedy: 'Check the alignment of these trials, or leave them out later with a reason.',
      place: { trial: quiet[0] },
    });
  const outliers = outlyingTrials(trialTotals);
  if (outliers.length > 0)
    problems.push({
      code: 'trial-outlier',
      severity: 'notes',
      message: `${plural(outliers.length, 'trial')} ${outliers.length === 1 ? 'has' : 'have'} a total count far from the others; the first is given.`,
      remedy: 'Look at these trials; they can be left out later with a reason.',
      place: { trial: outliers[0] },
    });
  return problems;
}

/** Totals more than 8 scaled median absolute deviations from the median (common practice, no source for the 8). */
function outlyingTrials(totals: Float64Array): number[] {
  const middle = median(totals);
  const spread = 1.4826 * median(totals.map((total) => Math.abs(total - middle)));
  return spread === 0
    ? []
    : indicesWhere(totals, (total) => total > 0 && Math.abs(total - middle) > 8 * spread);
}

function median(values: Float64Array): number {
  const sorted = values.slice().sort();
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half] : (sorted[half - 1] + sorted[half]) / 2;
}

function indicesWhere(values: Float64Array, claim: (value: number, index: number) => boolean): number[] {
  const found: number[] = [];
  values.forEach((value, index) => {
    if (claim(value, index)) found.push(index);
  });
  return found;
}

function firstDuplicate(
  n: number,
  counts: (index: number) => boolean,
  keyOf: (index: number) => string,
): { first: number; times: number } | null {
  const seen = new Set<string>();
  let first = -1;
  let times = 0;
  for (let index = 0; index < n; index++) {
    if (!counts(index)) continue;
    const key = keyOf(index);
    if (seen.has(key)) {
      times += 1;
      if (first === -1) first = index;
    }
    seen.add(key);
  }
  return first === -1 ? null : { first, times };
}

function plural(n: number, noun: string): string {
  return n === 1 ? `1 ${noun}` : `${n} ${noun}s`;
}
