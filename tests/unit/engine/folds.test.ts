import { describe, expect, it } from 'vitest';
import { contiguousFolds } from '@/lib/engine/folds/contiguous-folds';
import { innerAssignment } from '@/lib/engine/folds/inner-assignment';
import { splitPositions } from '@/lib/engine/folds/split-positions';
import { stratifiedFolds } from '@/lib/engine/folds/stratified-folds';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import type { FoldsSpec, ReadoutInput } from '@/lib/engine/readout/types';
import { makeInput } from '@/tests/unit/engine/make-input';

const range = (n: number): Int32Array => Int32Array.from({ length: n }, (_, i) => i);

describe('stratified folds', () => {
  it('spread every level over all folds, sizes differing by at most one', () => {
    const y = Float64Array.from({ length: 47 }, (_, i) => (i % 5) / 4);
    const folds = stratifiedFolds(y, 4, 3);
    for (let level = 0; level < 5; level++) {
      const counts = [0, 0, 0, 0];
      folds.forEach((fold, i) => (counts[fold] += y[i] === level / 4 ? 1 : 0));
      expect(Math.max(...counts) - Math.min(...counts)).toBeLessThanOrEqual(1);
    }
    const sizes = [0, 1, 2, 3].map((fold) => folds.filter((f) => f === fold).length);
    expect(Math.max(...sizes) - Math.min(...sizes)).toBeLessThanOrEqual(1);
  });

  it('cut a continuous label into runs of k neighbours, one a fold', () => {
    const y = Float64Array.from({ length: 50 }, (_, i) => Math.sin(i * 12.9898) * 43758.5453);
    const folds = stratifiedFolds(y, 5, 3);
    const order = range(50).sort((a, b) => y[a] - y[b]);
    for (let start = 0; start < 50; start += 5) {
      expect(new Set(Array.from(order.slice(start, start + 5), (i) => folds[i])).size).toBe(5);
    }
  });

  it('depend on seed and repeat alone', () => {
    const y = Float64Array.from({ length: 30 }, (_, i) => (i % 3) / 2);
    expect(stratifiedFolds(y, 5, 3, 0, 1)).toEqual(stratifiedFolds(y, 5, 3, 0, 1));
    expect(stratifiedFolds(y, 5, 3, 0, 1)).not.toEqual(stratifiedFolds(y, 5, 3, 0, 2));
    expect(stratifiedFolds(y, 5, 3, 0, 1)).not.toEqual(stratifiedFolds(y, 5, 4, 0, 1));
  });
});

describe('contiguous folds', () => {
  it('are runs of consecutive trials', () => {
    expect(Array.from(contiguousFolds(11, 3))).toEqual([0, 0, 0, 0, 1, 1, 1, 1, 2, 2, 2]);
  });

  it('purge training trials by their number in the session, excluded trials counting as time', () => {
    const trials = Int32Array.of(0, 1, 2, 10, 11, 12, 13, 20, 21);
    const foldOf = Int32Array.of(0, 0, 0, 1, 1, 1, 2, 2, 2);
    const { train, test, nPurged } = splitPositions(foldOf, [1], trials, 8);
    expect(Array.from(test)).toEqual([3, 4, 5]);
    expect(Array.from(train)).toEqual([0, 1, 8]);
    expect(nPurged).toBe(3);
  });
});

describe('inner folds', () => {
  const y = Float64Array.from({ length: 30 }, (_, i) => (i % 3) / 2);
  it('are of the outer kind', () => {
    const contiguous = innerAssignment(y, range(30), { kind: 'contiguous', k: 5, purgeTrials: 2 }, 3, 1);
    expect(contiguous).toEqual({ foldOf: contiguousFolds(30, 3), k: 3, purgeTrials: 2 });
    const group = range(30).map((i) => Math.floor(i / 10));
    const groups = innerAssignment(y, range(30), { kind: 'leaveOneGroupOut', group }, 5, 1);
    expect(groups.foldOf).toEqual(group);
    expect(groups.k).toBe(3);
  });
});

describe('what cannot be split is told in words', () => {
  const problemsOf = (changes: Partial<ReadoutInput>, options = {}): string[] => {
    const planned = planReadout(makeInput(options, changes));
    return planned.ok
      ? planned.plan.warnings.map(({ message }) => message)
      : planned.problems.map(({ message }) => message);
  };
  it('fewer trials than folds', () => {
    expect(problemsOf({ folds: { kind: 'stratified', k: 61, repeats: 1 } })).toEqual([
      '60 trials cannot be split into 61 folds.',
    ]);
  });
  it('a constant label', () => {
    expect(problemsOf({ y: new Float64Array(60).fill(0.4) })).toEqual([
      'The label “shared fraction” is 0.4 in every included trial; there is nothing to read out.',
    ]);
  });
  it('too few trials', () => {
    expect(problemsOf({ trialIndex: Int32Array.of(3, 5, 8) })[0]).toMatch(/^Only 3 trials take part/);
  });
  it('a level with one trial under stratified folds', () => {
    const y = makeInput().y.map((value, i) => (i === 7 ? 0.9 : value));
    expect(problemsOf({ y })[0]).toMatch(/^Level 0.9 of “shared fraction” has one trial/);
  });
  it('a level missing from a training set warns', () => {
    const y = Float64Array.from({ length: 60 }, (_, i) => Math.floor(i / 12) / 4);
    const messages = problemsOf({ y, folds: { kind: 'contiguous', k: 5, purgeTrials: 0 } });
    expect(messages[0]).toBe(
      'Fold 1 has no training trial at level 0 of “shared fraction”: its readout must extrapolate there.',
    );
    expect(messages).toHaveLength(5);
  });
  it('a purge gap that leaves nothing to train on', () => {
    expect(problemsOf({ folds: { kind: 'contiguous', k: 3, purgeTrials: 40 } })[0]).toMatch(
      /has 0 training trials after the purge gap of 40/,
    );
  });
  it('one group', () => {
    expect(problemsOf({ folds: { kind: 'leaveOneGroupOut', group: new Int32Array(60) } })[0]).toMatch(
      /^All included trials are in one group/,
    );
  });
  it('given folds with a gap, or without a fold for a trial', () => {
    const given = (row: Int32Array): FoldsSpec => ({ kind: 'given', assignment: [row] });
    expect(problemsOf({ folds: given(range(60).map((i) => (i % 2) * 2)) })[0]).toBe(
      'The given folds leave fold 1 without trials.',
    );
    expect(problemsOf({ folds: given(range(60).map((i) => (i === 4 ? -1 : i % 2))) })[0]).toBe(
      'Trial 5 takes part but has no fold.',
    );
    expect(problemsOf({ folds: given(range(59)) })[0]).toBe('The given folds have 59 entries for 60 trials.');
  });
  it('a window edge that is not a bin edge', () => {
    expect(problemsOf({ window: { startMs: 0, endMs: 60 } })[0]).toMatch(
      /The window's end \(60 ms\) is not a bin edge; bins of 25 ms begin at 0 ms/,
    );
    expect(problemsOf({ window: { startMs: -25, endMs: 50 } })[0]).toMatch(
      /reaches outside the recorded bins \[0, 100\) ms/,
    );
  });
});
