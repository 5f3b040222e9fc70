import type { Intake } from '@/lib/contracts/intake';
import type { IntakePreview } from '@/lib/contracts/intake-answer';
import type { Column } from '@/lib/intake/column';
import { deriveFacts } from '@/lib/intake/derive-facts';
import { readSession } from '@/lib/intake/mapping/read-session';
import type { SourceFiles } from '@/lib/intake/mapping/source-files';

/** Reads a session as the mapping says and gives its first trials; nothing is written. */
export async function previewSession(
  files: SourceFiles,
  intake: Intake,
  nFirst: number,
): Promise<IntakePreview> {
  const { read, problems } = await readSession(files, intake);
  if (read === null) return { nTrials: 0, nUnits: 0, nBins: 0, columns: [], totals: [], problems };
  const n = Math.min(nFirst, read.nTrials);
  const plain = (column: Column): (number | string | null)[] =>
    Array.from<number | string | null>(column.values.slice(0, n)).map((value) =>
      typeof value === 'number' && !Number.isFinite(value) ? null : value,
    );
  return {
    nTrials: read.nTrials,
    nUnits: read.nUnits,
    nBins: read.nBins,
    columns: read.trials.map((column) => ({ name: column.name, type: column.type, values: plain(column) })),
    totals: Array.from(deriveFacts(read).trialTotals.subarray(0, n)),
    firstTrial: firstTrialOf(read.counts, read.nUnits, read.nBins),
    problems,
  };
}

const mostUnits = 24;
const mostBins = 400;

/** The first trial's counts, a row a unit, as much of it as a picture can show. */
function firstTrialOf(counts: ArrayLike<number>, nUnits: number, nBins: number): number[][] {
  return Array.from({ length: Math.min(nUnits, mostUnits) }, (_, unit) =>
    Array.from({ length: Math.min(nBins, mostBins) }, (_unused, bin) => counts[unit * nBins + bin]),
  );
}
