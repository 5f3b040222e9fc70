import { cellsOf, isConstantWithin } from '@/lib/engine/controls/label-sampler';
import { logArrangements } from '@/lib/engine/measures/log-arrangements';
import { logFactorial } from '@/lib/engine/measures/log-factorial';
import type { EngineProblem, NullSpec } from '@/lib/engine/readout/types';

/** What a shuffling scheme can give for these labels. */
export interface DrawPlan {
  nDraws: number;
  /** ln of the number of distinct label sequences; null where it is not known (given permutations). */
  logArrangements: number | null;
  problems: EngineProblem[];
}

/**
 * Number of draws after all limits, number of distinct arrangements, and what is wrong with the scheme for these labels.
 * `y` and `trials` run over positions. Cost O(n log n).
 */
export function planDraws(scheme: NullSpec, y: Float64Array, trials: Int32Array, nTrials: number): DrawPlan {
  const n = y.length;
  const problems: EngineProblem[] = [];
  const stop = (code: string, message: string, remedy: string): DrawPlan => ({
    nDraws: 0,
    logArrangements: 0,
    problems: [{ code, severity: 'stops', message, remedy, place: {} }],
  });
  const codesOf = (codes: Int32Array): Int32Array => Int32Array.from(trials, (trial) => codes[trial]);
  switch (scheme.kind) {
    case 'none':
      return { nDraws: 0, logArrangements: 0, problems };
    case 'free':
      return { nDraws: scheme.draws, logArrangements: logArrangements(y, null), problems };
    case 'within': {
      if (scheme.codes.length !== nTrials)
        return stop(
          'null-invalid',
          'The column to shuffle within does not match the trials.',
          'Choose a trial column.',
        );
      const codes = codesOf(scheme.codes);
      const log = logArrangements(y, codes);
      if (log === 0) {
        return stop(
          'null-single-arrangement',
          'Within the levels of that column the label never varies: shuffling changes nothing.',
          'Shuffle within another column, or freely if the labels are exchangeable.',
        );
      }
      return { nDraws: scheme.draws, logArrangements: log, problems };
    }
    case 'groups': {
      if (scheme.codes.length !== nTrials)
        return stop('null-invalid', 'The group column does not match the trials.', 'Choose a trial column.');
      const cells = cellsOf(codesOf(scheme.codes));
      const log = isConstantWithin(cells, y)
        ? logArrangements(
            Float64Array.from(cells, (cell) => y[cell[0]]),
            null,
          )
        : logSequenceArrangements(cells, y);
      if (log === 0) {
        return stop(
          'null-single-arrangement',
          'The groups cannot be exchanged: no two of equal size differ in their labels.',
          'Choose a column with several groups of equal size.',
        );
      }
      return { nDraws: scheme.draws, logArrangements: log, problems };
    }
    case 'circularShift': {
      const nDraws = Math.min(scheme.draws, n - 1);
      if (nDraws < scheme.draws) {
        problems.push({
          code: 'fewer-shifts-than-draws',
          severity: 'notes',
          message: `${n} trials have ${n - 1} circular shifts; all of them are used instead of ${scheme.draws} draws.`,
          place: {},
        });
      }
      return { nDraws, logArrangements: Math.log(n), problems };
    }
    case 'sessions':
      if (scheme.sequences.length === 0)
        return stop(
          'null-invalid',
          'There is no other session of the same design to take labels from.',
          'Choose another scheme.',
        );
      if (scheme.sequences.length < 19) {
        problems.push({
          code: 'few-sessions-for-null',
          severity: 'warns',
          message: `${scheme.sequences.length} other sessions give p values of 1/${scheme.sequences.length + 1} at the smallest; .05 needs 19.`,
          place: {},
        });
      }
      return {
        nDraws: scheme.sequences.length,
        logArrangements: Math.log(scheme.sequences.length + 1),
        problems,
      };
    case 'given': {
      const wrong = scheme.permutations.findIndex(
        (row) => row.length !== n || row.some((i) => i < 0 || i >= n),
      );
      if (wrong >= 0 || scheme.permutations.length === 0) {
        return stop(
          'null-invalid',
          scheme.permutations.length === 0
            ? 'No permutation was given.'
            : `Given permutation ${wrong} does not index the ${n} trials that take part.`,
          `Give rows of ${n} indices from 0 to ${n - 1}.`,
        );
      }
      return { nDraws: scheme.permutations.length, logArrangements: null, problems };
    }
  }
}

function logSequenceArrangements(cells: Int32Array[], y: Float64Array): number {
  const bySize = new Map<number, Map<string, number>>();
  for (const cell of cells) {
    const sequences = bySize.get(cell.length) ?? new Map<string, number>();
    const key = Array.from(cell, (i) => y[i]).join();
    sequences.set(key, (sequences.get(key) ?? 0) + 1);
    bySize.set(cell.length, sequences);
  }
  let log = 0;
  for (const sequences of bySize.values()) {
    const counts = [...sequences.values()];
    log += logFactorial(counts.reduce((a, b) => a + b, 0));
    for (const count of counts) log -= logFactorial(count);
  }
  return Math.max(0, log);
}
