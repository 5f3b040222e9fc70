import type { Intake } from '@/lib/contracts/intake';
import type { Problem } from '@/lib/contracts/problem';
import { checkSession } from '@/lib/intake/checks/check-session';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { buildLabels } from '@/lib/intake/mapping/build-labels';
import { compareLengths } from '@/lib/intake/mapping/compare-lengths';
import { readCounts } from '@/lib/intake/mapping/read-counts';
import { readTable } from '@/lib/intake/mapping/read-table';
import { readStimulus } from '@/lib/intake/mapping/read-stimulus';
import type { SourceFiles } from '@/lib/intake/mapping/source-files';
import type { SessionData } from '@/lib/intake/session-data';

/**
 * Reads a session as its mapping says and checks it. `data` is null where a problem stops; `read` is what could be read
 * even so, for a preview. A refusal of one part ends the reading; faults that can be told together are.
 */
export async function readSession(
  files: SourceFiles,
  intake: Intake,
): Promise<{ data: SessionData | null; read: SessionData | null; problems: Problem[] }> {
  try {
    const { counts } = intake;
    if ('spikeTimes' in counts && counts.spikeTimes.startMs !== intake.windowStartMs)
      throw new IntakeRefusal(
        'window-start',
        `The window of the spike times begins at ${counts.spikeTimes.startMs} ms, windowStartMs says ${intake.windowStartMs}.`,
        'Give both the same value.',
      );
    const tableTrials = await readTable(files, intake.trials, 'trial');
    const units = intake.units === undefined ? [] : await readTable(files, intake.units, 'unit');
    const stimulus =
      intake.stimulus === undefined
        ? undefined
        : await readStimulus(files, intake.stimulus, tableTrials[0].values.length);
    const { trials, labels, remarks } = buildLabels(intake.labels, tableTrials, stimulus);
    const { builder, fileName, arrayType } = await readCounts(
      files,
      intake.counts,
      {
        trials: tableTrials,
        units,
      },
      intake.binWidthMs,
    );
    const [nTrials, nUnits, nBins] = builder.shape;
    const faults = [
      ...builder.problems({
        file: fileName,
        ...('path' in intake.counts ? { path: intake.counts.path } : {}),
      }),
      ...compareLengths(builder.shape, trials[0].values.length, units[0]?.values.length, fileName),
    ];
    if (faults.length > 0) return { data: null, read: null, problems: faults };
    const data: SessionData = {
      counts: builder.counts,
      nTrials,
      nUnits,
      nBins,
      binWidthMs: intake.binWidthMs,
      windowStartMs: intake.windowStartMs,
      trials,
      units,
      labels,
      ...(stimulus === undefined ? {} : { stimulus }),
    };
    const found = checkSession(data, { arrayType, longWithoutShape: isLongWithoutShape(intake) });
    const problems = [...found, ...remarks];
    const isStopped = problems.some((problem) => problem.severity === 'stops');
    return { data: isStopped ? null : data, read: data, problems };
  } catch (error) {
    if (error instanceof IntakeRefusal) return { data: null, read: null, problems: [error.toProblem()] };
    throw error;
  }
}

function isLongWithoutShape(intake: Intake): boolean {
  return 'long' in intake.counts && intake.counts.long.shape === undefined;
}
