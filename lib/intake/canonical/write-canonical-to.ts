import { createHash } from 'node:crypto';
import { hashCounts } from '@/lib/intake/canonical/hash-counts';
import { hashParts } from '@/lib/intake/canonical/hash-parts';
import { narrowCounts } from '@/lib/intake/canonical/narrow-counts';
import type { PartRecord } from '@/lib/intake/canonical/part-record';
import { writeColumns } from '@/lib/intake/canonical/write-columns';
import { writeCountsPart } from '@/lib/intake/canonical/write-counts-part';
import { writeStimulusPart } from '@/lib/intake/canonical/write-stimulus-part';
import type { SessionData } from '@/lib/intake/session-data';

const COUNTS_PART_BYTES = 8 * 1024 * 1024;

/** One object of the canonical form with what is kept about it. */
export type CanonicalPart = PartRecord & { bytes: Uint8Array };

/**
 * Writes a session's canonical form: counts in parts of about 8 MiB by trials (`counts-0`, `counts-1` …), `trials`,
 * `units`, and `stimulus` if there is one, each the bytes of an Arrow IPC file. Parts are made one at a time and handed
 * to `keep`, so that only one is in memory. Every fact (shape, bin width, window start, column types, labels) stands in
 * schema metadata, so the hashes cover it. Equal data give equal bytes.
 *
 * @returns the parts' records, `dataHash` over the parts' hashes and `countsHash` over the counts alone.
 */
export async function writeCanonicalTo(
  data: SessionData,
  keep: (part: CanonicalPart) => Promise<void> | void,
): Promise<{ parts: PartRecord[]; dataHash: string; countsHash: string }> {
  const { nTrials, nUnits, nBins } = data;
  if (data.counts.length !== nTrials * nUnits * nBins)
    throw new Error(`${data.counts.length} counts do not fill ${nTrials} × ${nUnits} × ${nBins}`);
  const counts = narrowCounts(data.counts);
  const shared = new Map([
    ['outfold.form', '1'],
    ['outfold.nTrials', String(nTrials)],
    ['outfold.nUnits', String(nUnits)],
    ['outfold.nBins', String(nBins)],
    ['outfold.binWidthMs', String(data.binWidthMs)],
    ['outfold.windowStartMs', String(data.windowStartMs)],
  ]);
  const records: PartRecord[] = [];
  const add = async (name: string, bytes: Uint8Array, layout?: PartRecord['counts']): Promise<void> => {
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    const record: PartRecord = {
      name,
      sizeBytes: bytes.byteLength,
      sha256,
      ...(layout ? { counts: layout } : {}),
    };
    records.push(record);
    await keep({ ...record, bytes });
  };

  const trialBytes = nUnits * nBins * counts.BYTES_PER_ELEMENT;
  const trialsPerPart = Math.max(1, Math.floor(COUNTS_PART_BYTES / trialBytes));
  for (let trialFrom = 0, part = 0; trialFrom < nTrials; trialFrom += trialsPerPart, part++) {
    const n = Math.min(trialsPerPart, nTrials - trialFrom);
    const from = trialFrom * nUnits * nBins;
    const slab = counts.subarray(from, from + n * nUnits * nBins);
    const { bytes, layout } = writeCountsPart(
      { counts: slab, nTrials: n, nUnits, nBins, trialFrom },
      new Map([['outfold.part', 'counts'], ...shared]),
    );
    await add(`counts-${part}`, bytes, layout);
  }
  const labels = new Map(data.labels.map((label) => [label.column, label]));
  await add(
    'trials',
    writeColumns(data.trials, nTrials, new Map([['outfold.part', 'trials'], ...shared]), (column) => {
      const label = labels.get(column.name);
      if (label === undefined) return [];
      const made: [string, string][] = label.made ? [['outfold.labelMade', JSON.stringify(label.made)]] : [];
      return [['outfold.label', label.kind], ...made];
    }),
  );
  await add('units', writeColumns(data.units, nUnits, new Map([['outfold.part', 'units'], ...shared])));
  if (data.stimulus)
    await add(
      'stimulus',
      writeStimulusPart(data.stimulus, nTrials, new Map([['outfold.part', 'stimulus'], ...shared])),
    );
  return {
    parts: records,
    dataHash: hashParts(records),
    countsHash: hashCounts(counts, [nTrials, nUnits, nBins]),
  };
}
