import type { Intake } from '@/lib/contracts/intake';
import type { Problem } from '@/lib/contracts/problem';
import { readSession } from '@/lib/intake/mapping/read-session';
import type { SourceFile } from '@/lib/intake/mapping/source-files';
import { memorySource } from '@/lib/intake/memory-source';
import { openFile } from '@/lib/intake/readers/open-file';
import { makeNpy } from './make-npy';

export const countsId = '00000000-0000-7000-8000-000000000001';
export const trialsId = '00000000-0000-7000-8000-000000000002';
export const unitsId = '00000000-0000-7000-8000-000000000003';
export const nTrials = 24;
export const nUnits = 6;
export const nBins = 4;

/** Counts without any fault: varied, none silent, no two trials or units alike, no company with the label. */
export function soundCounts(): Float64Array {
  let state = 12345;
  return Float64Array.from({ length: nTrials * nUnits * nBins }, () => {
    state = (state * 1103515245 + 12345) & 0x7fffffff;
    return [0, 1, 1, 2, 3, 1, 0, 2][(state >> 16) & 7];
  });
}

export function npyOf(values: Float64Array, shape: number[], order: 'C' | 'F' = 'C'): Uint8Array {
  return makeNpy({
    descr: "'<f8'",
    fortran: order === 'F' ? 'True' : 'False',
    shape: `(${shape.join(', ')},)`,
    data: new Uint8Array(values.buffer.slice(0)),
  });
}

/** A label over six levels in an order that follows neither trial order nor anything else. */
export const soundLabel = (trial: number): number =>
  [0, 0.6, 0.2, 1, 0.8, 0.4][(trial * 5 + (trial >> 2)) % 6];

/** A trial table as text; `change` gives other cells. */
export function trialTable(
  change: (row: Record<string, string>, trial: number) => void = () => undefined,
): string {
  const rows = Array.from({ length: nTrials }, (_, trial) => {
    const row: Record<string, string> = {
      trial: String(trial),
      fraction: String(soundLabel(trial)),
      speed: String(3 + ((trial * 7) % 11) / 10),
      direction: String((trial * 137) % 360),
      start: String(0.5 + 2 * trial),
    };
    change(row, trial);
    return row;
  });
  return `${Object.keys(rows[0]).join(',')}\n${rows.map((row) => Object.values(row).join(',')).join('\n')}\n`;
}

export const soundIntake: Intake = {
  counts: { fileId: countsId, path: '', axes: ['trial', 'unit', 'bin'] },
  binWidthMs: 25,
  windowStartMs: -50,
  trials: { fileId: trialsId },
  labels: [{ column: 'fraction', kind: 'nominal' }],
  acceptWarnings: false,
};

/** Reads a session of which any part may have been changed. */
export async function problemsOf(
  given: {
    counts?: Uint8Array | string;
    trials?: Uint8Array | string;
    units?: Uint8Array | string;
    intake?: Partial<Intake>;
  } = {},
): Promise<Problem[]> {
  const files = new Map<string, SourceFile>();
  const add = async (fileId: string, name: string, content: Uint8Array | string): Promise<void> => {
    const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
    files.set(fileId, { name, file: await openFile(memorySource(bytes)) });
  };
  await add(countsId, 'counts', given.counts ?? npyOf(soundCounts(), [nTrials, nUnits, nBins]));
  await add(trialsId, 'trials', given.trials ?? trialTable());
  if (given.units !== undefined) await add(unitsId, 'units', given.units);
  const { problems } = await readSession(files, { ...soundIntake, ...given.intake });
  return problems;
}
