import type { Recipe } from '@/lib/contracts/recipe';
import type { FoldsSpec } from '@/lib/engine/readout/types';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';

type Row = (number | null)[];

/**
 * Given folds: one row a repeat over all of the session's trials, null where a trial takes no part. A number at a
 * trial that is excluded is not used. Inner folds, where given, are one row a fold (an array of those with repeats).
 */
export function resolveGivenFolds(
  { assignment, inner }: Recipe['folds'],
  nTrials: number,
  trialIndex: Int32Array,
): { folds: FoldsSpec } | { faults: RecipeFault[] } {
  const pointer = '/recipe/folds/assignment';
  if (!assignment)
    return { faults: [{ pointer, code: 'required', message: 'Given folds need the fold of each trial.' }] };
  const isNested = Array.isArray(assignment[0]);
  const rows = isNested ? (assignment as Row[]) : [assignment as Row];
  const at = (repeat: number) => (isNested ? `${pointer}/${repeat}` : pointer);
  const faults = rows.flatMap((row, repeat) => rowFaults(row, at(repeat), nTrials, trialIndex));
  if (faults.length > 0) return { faults };

  const outer = rows.map((row) => foldsOfIncluded(row, nTrials, trialIndex));
  outer.forEach((row, repeat) => faults.push(...numberFaults(row, at(repeat), trialIndex)));
  const innerOfRepeats = inner === undefined ? undefined : isNested ? (inner as Row[][]) : [inner as Row[]];
  innerOfRepeats?.forEach((innerRows, repeat) =>
    faults.push(
      ...innerFaults(
        innerRows,
        outer[repeat],
        isNested ? `/recipe/folds/inner/${repeat}` : '/recipe/folds/inner',
        trialIndex,
      ),
    ),
  );
  if (innerOfRepeats && innerOfRepeats.length !== outer.length)
    faults.push({
      pointer: '/recipe/folds/inner',
      code: 'length',
      message: `There are ${outer.length} repeats but inner folds of ${innerOfRepeats.length}.`,
    });
  if (faults.length > 0) return { faults };
  const innerArrays = innerOfRepeats?.map((innerRows) =>
    innerRows.map((row) => Int32Array.from(row, (fold) => fold ?? -1)),
  );
  return {
    folds: { kind: 'given', assignment: outer, ...(innerArrays ? { inner: innerArrays } : {}) },
  };
}

function foldsOfIncluded(row: Row, nTrials: number, trialIndex: Int32Array): Int32Array {
  const folds = new Int32Array(nTrials).fill(-1);
  for (const trial of trialIndex) folds[trial] = row[trial] ?? -1;
  return folds;
}

function rowFaults(row: Row, pointer: string, nTrials: number, trialIndex: Int32Array): RecipeFault[] {
  if (!Array.isArray(row) || row.length !== nTrials)
    return [
      {
        pointer,
        code: 'length',
        message: `The folds are of ${Array.isArray(row) ? row.length : 1} trials, but the session has ${nTrials}; excluded trials are null.`,
      },
    ];
  const without = trialIndex.find((trial) => row[trial] === null);
  if (without === undefined) return [];
  return [
    {
      pointer: `${pointer}/${without}`,
      code: 'no-fold',
      message: `Trial ${without} has a fold in another repeat and none in this one.`,
      place: { trial: without },
    },
  ];
}

/** Folds must be 0 … k − 1 with at least one included trial each, two at least. */
function numberFaults(folds: Int32Array, pointer: string, trialIndex: Int32Array): RecipeFault[] {
  const used = new Set(Array.from(trialIndex, (trial) => folds[trial]));
  const k = Math.max(...used) + 1;
  if (k < 2) return [{ pointer, code: 'too-few-folds', message: 'Two folds at least are needed.' }];
  const empty = Array.from({ length: Math.min(k, trialIndex.length + 1) }, (_, fold) => fold).find(
    (fold) => !used.has(fold),
  );
  if (empty === undefined) return [];
  return [
    {
      pointer,
      code: 'empty-fold',
      message: `Fold ${empty} has no trial that takes part, though the folds run to ${k - 1}; they count from 0 without gaps.`,
      place: { fold: empty },
    },
  ];
}

function innerFaults(rows: Row[], outer: Int32Array, pointer: string, trialIndex: Int32Array): RecipeFault[] {
  const k = Math.max(...Array.from(trialIndex, (trial) => outer[trial])) + 1;
  if (rows.length !== k)
    return [{ pointer, code: 'length', message: `There are ${k} folds but inner folds of ${rows.length}.` }];
  return rows.flatMap((row, fold): RecipeFault[] => {
    if (!Array.isArray(row) || row.length !== outer.length)
      return [
        {
          pointer: `${pointer}/${fold}`,
          code: 'length',
          message: `Inner folds must be of all ${outer.length} trials; null outside the training trials.`,
        },
      ];
    const without = trialIndex.find((trial) => outer[trial] !== fold && row[trial] === null);
    const held = trialIndex.find((trial) => outer[trial] === fold && row[trial] !== null);
    const trial = without ?? held;
    if (trial === undefined) return [];
    return [
      {
        pointer: `${pointer}/${fold}/${trial}`,
        code: without === undefined ? 'held-out-trial' : 'no-fold',
        message:
          without === undefined
            ? `Trial ${trial} is held out in fold ${fold} and must not have an inner fold there.`
            : `Trial ${trial} is a training trial of fold ${fold} and has no inner fold.`,
        place: { trial, fold },
      },
    ];
  });
}
