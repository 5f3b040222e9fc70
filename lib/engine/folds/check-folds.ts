import { labelLevels } from '@/lib/engine/features/label-strata';
import type { FoldAssignment } from '@/lib/engine/folds/assign-folds';
import { splitPositions } from '@/lib/engine/folds/split-positions';
import type { EngineProblem, FoldsSpec } from '@/lib/engine/readout/types';

/** Fewest training trials that a fold may have: leave-one-out and a slope need that many. */
const MIN_TRAINING_TRIALS = 4;

const stops = (code: string, message: string, remedy: string, fold?: number): EngineProblem => ({
  code,
  severity: 'stops',
  message,
  remedy,
  place: fold === undefined ? {} : { fold },
});

/**
 * What speaks against a fold specification before folds are made: too few trials, a constant label, too few groups,
 * given folds of the wrong shape. `y` and `trials` run over positions. Empty when nothing does.
 */
export function checkFoldsSpec(
  y: Float64Array,
  trials: Int32Array,
  spec: FoldsSpec,
  nTrials: number,
  labelName: string,
): EngineProblem[] {
  const n = y.length;
  if (n < MIN_TRAINING_TRIALS + 1) {
    return [
      stops(
        'too-few-trials',
        `Only ${n} trials take part; a readout needs at least ${MIN_TRAINING_TRIALS + 1}.`,
        'Include more trials.',
      ),
    ];
  }
  if (y.every((value) => value === y[0])) {
    return [
      stops(
        'constant-label',
        `The label “${labelName}” is ${y[0]} in every included trial; there is nothing to read out.`,
        'Choose another label or include trials in which it differs.',
      ),
    ];
  }
  if (spec.kind === 'stratified' || spec.kind === 'contiguous') {
    if (!Number.isInteger(spec.k) || spec.k < 2)
      return [
        stops(
          'folds-invalid',
          `${spec.k} folds cannot be made; at least 2 are needed.`,
          'Ask for 2 folds or more.',
        ),
      ];
    if (spec.k > n) {
      return [
        stops(
          'fewer-trials-than-folds',
          `${n} trials cannot be split into ${spec.k} folds.`,
          `Ask for at most ${n} folds or include more trials.`,
        ),
      ];
    }
  }
  if (spec.kind === 'stratified') {
    const levels = labelLevels(y);
    const counts =
      levels === null
        ? []
        : Array.from(levels.values, (_, code) => levels.codes.filter((c) => c === code).length);
    const lonely = counts.findIndex((count) => count < 2);
    if (levels !== null && lonely >= 0) {
      return [
        stops(
          'level-too-small',
          `Level ${levels.values[lonely]} of “${labelName}” has one trial: whichever fold holds it out is trained without that level.`,
          'Leave that trial out, or use contiguous or given folds.',
        ),
      ];
    }
  }
  if (spec.kind === 'leaveOneGroupOut') {
    if (spec.group.length !== nTrials)
      return [
        stops(
          'folds-invalid',
          `The group column has ${spec.group.length} entries for ${nTrials} trials.`,
          'Give one group for each trial.',
        ),
      ];
    const groups = new Set(Array.from(trials, (trial) => spec.group[trial]));
    if (groups.size < 2)
      return [
        stops(
          'too-few-groups',
          'All included trials are in one group; leaving it out leaves nothing to train on.',
          'Choose a column with at least two groups.',
        ),
      ];
  }
  if (spec.kind === 'given') return checkGiven(trials, spec, nTrials);
  return [];
}

function checkGiven(
  trials: Int32Array,
  spec: FoldsSpec & { kind: 'given' },
  nTrials: number,
): EngineProblem[] {
  const remedy = `Give one fold number (or null) for each of the session's ${nTrials} trials.`;
  if (spec.assignment.length === 0) return [stops('folds-invalid', 'The given folds are empty.', remedy)];
  for (const [repeat, row] of spec.assignment.entries()) {
    if (row.length !== nTrials)
      return [
        stops('folds-invalid', `The given folds have ${row.length} entries for ${nTrials} trials.`, remedy),
      ];
    const used = new Set<number>();
    for (const trial of trials) {
      if (row[trial] < 0) {
        return [
          {
            ...stops(
              'folds-invalid',
              `Trial ${trial + 1} takes part but has no fold${spec.assignment.length > 1 ? ` in repeat ${repeat + 1}` : ''}.`,
              remedy,
            ),
            place: { trial },
          },
        ];
      }
      used.add(row[trial]);
    }
    if (used.size < 2)
      return [stops('folds-invalid', 'The given folds hold one fold only.', 'Give at least two folds.')];
    const highest = Math.max(...used);
    for (let fold = 0; fold <= highest; fold++) {
      if (!used.has(fold))
        return [
          stops(
            'folds-invalid',
            `The given folds leave fold ${fold} without trials.`,
            'Number the folds 0, 1, 2 … without gaps.',
            fold,
          ),
        ];
    }
  }
  return [];
}

/**
 * What speaks against the folds that were made: a training set too small, constant, or without one of the label's
 * levels (a warning: the readout must extrapolate there). One problem a fold at most.
 */
export function checkFoldAssignment(
  y: Float64Array,
  trials: Int32Array,
  folds: FoldAssignment,
  labelName: string,
): EngineProblem[] {
  const levels = labelLevels(y);
  const problems: EngineProblem[] = [];
  folds.foldOf.forEach((foldOf, repeat) => {
    const suffix = folds.foldOf.length > 1 ? ` of repeat ${repeat + 1}` : '';
    for (let fold = 0; fold < folds.k; fold++) {
      const { train } = splitPositions(foldOf, [fold], trials, folds.purgeTrials);
      const name = `Fold ${fold + 1}${suffix}`;
      if (train.length < MIN_TRAINING_TRIALS) {
        problems.push(
          stops(
            'training-set-too-small',
            `${name} has ${train.length} training trials${folds.purgeTrials > 0 ? ` after the purge gap of ${folds.purgeTrials}` : ''}; at least ${MIN_TRAINING_TRIALS} are needed.`,
            'Use more trials, fewer folds or a smaller gap.',
            fold,
          ),
        );
        continue;
      }
      if (train.every((i) => y[i] === y[train[0]])) {
        problems.push(
          stops(
            'constant-training-label',
            `${name} is trained on trials whose “${labelName}” is ${y[train[0]]} throughout.`,
            'Use stratified folds, or other blocks.',
            fold,
          ),
        );
        continue;
      }
      if (levels === null) continue;
      const present = new Set(Array.from(train, (i) => levels.codes[i]));
      const missing = Array.from(levels.values).filter((_, code) => !present.has(code));
      if (missing.length > 0) {
        problems.push({
          code: 'level-missing-in-training',
          severity: 'warns',
          message: `${name} has no training trial at ${missing.length === 1 ? 'level' : 'levels'} ${missing.join(', ')} of “${labelName}”: its readout must extrapolate there.`,
          remedy: 'Use stratified folds, or fewer and larger blocks.',
          place: { fold },
        });
      }
    }
  });
  return problems;
}
