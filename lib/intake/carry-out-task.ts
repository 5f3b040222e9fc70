import type { ByteSource } from '@/lib/intake/byte-source';
import { bufferedSource } from '@/lib/intake/buffered-source';
import { writeCanonicalTo } from '@/lib/intake/canonical/write-canonical-to';
import { columnFacts } from '@/lib/intake/column-facts';
import { inspectFile } from '@/lib/intake/inspect-file';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { findArray } from '@/lib/intake/mapping/find-array';
import { readSession } from '@/lib/intake/mapping/read-session';
import type { SourceFile } from '@/lib/intake/mapping/source-files';
import { previewSession } from '@/lib/intake/preview-session';
import { readMatrix } from '@/lib/intake/read-matrix';
import type { IntakeOutcome, ReaderAnswer, ReaderFile, ReaderTask } from '@/lib/intake/reader-messages';
import { openFile } from '@/lib/intake/readers/open-file';

/** What a reader may ask of the process that started it. */
export interface ReaderHost {
  sourceOf(file: ReaderFile): ByteSource;
  keep(dataHash: string, name: string, bytes: Uint8Array): Promise<void>;
}

/** Does one reader task. Faults of the files are in the answer; anything thrown is ours. */
export async function carryOutTask(task: ReaderTask, host: ReaderHost): Promise<ReaderAnswer> {
  if (task.kind === 'inspect') {
    const { file } = task;
    return {
      kind: 'inspected',
      inspection: await inspectFile(bufferedSource(host.sourceOf(file)), file.name),
    };
  }
  if (task.kind === 'matrix') return takeMatrix(task, host);
  const files = new Map<string, SourceFile>();
  try {
    for (const file of task.files) {
      try {
        files.set(file.fileId, {
          name: file.name,
          file: await openFile(bufferedSource(host.sourceOf(file))),
        });
      } catch (error) {
        if (!(error instanceof IntakeRefusal)) throw error;
        const problems = [error.toProblem({ file: file.name })];
        if (task.kind === 'preview')
          return {
            kind: 'previewed',
            preview: { nTrials: 0, nUnits: 0, nBins: 0, columns: [], totals: [], problems },
          };
        return { kind: 'taken', outcome: { problems, made: null } };
      }
    }
    if (task.kind === 'preview')
      return { kind: 'previewed', preview: await previewSession(files, task.intake, task.nTrials) };
    return { kind: 'taken', outcome: await takeIn(files, task, host) };
  } finally {
    for (const { file } of files.values()) file.close();
  }
}

async function takeMatrix(
  task: Extract<ReaderTask, { kind: 'matrix' }>,
  host: ReaderHost,
): Promise<ReaderAnswer> {
  const { fileId, name } = task.file;
  try {
    const file = await openFile(bufferedSource(host.sourceOf(task.file)));
    try {
      const { array } = findArray(new Map([[fileId, { name, file }]]), fileId, task.path, 'the permutations');
      return { kind: 'matrix', matrix: await readMatrix(array, name, task.maxEntries), problems: [] };
    } finally {
      file.close();
    }
  } catch (error) {
    if (!(error instanceof IntakeRefusal)) throw error;
    return { kind: 'matrix', matrix: null, problems: [error.toProblem({ file: name })] };
  }
}

async function takeIn(
  files: Map<string, SourceFile>,
  task: Extract<ReaderTask, { kind: 'intake' }>,
  host: ReaderHost,
): Promise<IntakeOutcome> {
  const { data, problems } = await readSession(files, task.intake);
  const isWaiting = !task.intake.acceptWarnings && problems.some((problem) => problem.severity === 'warns');
  if (data === null || isWaiting) return { problems, made: null };
  // Objects lie under the hash of all of them, so they are made twice, the first time for the hash alone: a second or so
  // for the largest sessions, against holding all of them in memory.
  const { dataHash, countsHash, parts } = await writeCanonicalTo(data, () => undefined);
  await writeCanonicalTo(data, (part) => host.keep(dataHash, part.name, part.bytes));
  return {
    problems,
    made: {
      dataHash,
      countsHash,
      parts,
      nTrials: data.nTrials,
      nUnits: data.nUnits,
      nBins: data.nBins,
      trialColumns: data.trials.map(columnFacts),
      unitColumns: data.units.map(columnFacts),
      labels: data.labels.map(({ column, kind }) => ({ column, kind })),
    },
  };
}
