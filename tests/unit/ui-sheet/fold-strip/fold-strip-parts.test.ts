import { describe, expect, it } from 'vitest';
import { blockStarts } from '@/components/fold-strip/block-starts';
import { foldRuns } from '@/components/fold-strip/fold-runs';
import { residualScale } from '@/components/fold-strip/residual-scale';
import type { StripData } from '@/components/fold-strip/strip-data';
import { valueLine } from '@/components/fold-strip/value-line';

describe('foldRuns', () => {
  it('finds the stretches of contiguous folds across left-out trials', () => {
    expect(foldRuns([0, 0, null, 0, 1, 1, null], 2)).toEqual([
      { fold: 0, from: 0, to: 4 },
      { fold: 1, from: 4, to: 6 },
    ]);
  });
  it('says that woven folds have none', () => {
    expect(foldRuns([0, 1, 0, 1], 2)).toBeNull();
  });
  it('takes one trial a fold for a weave', () => {
    expect(foldRuns([0, 1, 2, 3], 4)).toBeNull();
  });
});

describe('blockStarts', () => {
  it('begins a block wherever the column changes, back and forth too', () => {
    expect(blockStarts(['a', 'a', 'b', 'a', 'a'])).toEqual([0, 2, 3]);
  });
});

describe('residualScale', () => {
  it('is held-out minus true and skips what is missing', () => {
    const { values, outlier } = residualScale([1, 2, null, 4], [1.5, 1, 3, null]);
    expect(values).toEqual([0.5, -1, null, null]);
    expect(outlier).toBeCloseTo(2.3 * Math.sqrt((0.25 + 1) / 2), 12);
  });
});

const data: StripData = {
  nTrials: 3,
  label: { name: 'fraction', values: [0.25, null, 1] },
  folds: { values: [1, null, 0], nFolds: 2, purgeTrials: 0 },
  predicted: [0.5, null, 0.9],
  excluded: [{ trial: 1, reason: 'room light on' }],
  block: { name: 'block', values: [1, 1, 2] },
  column: null,
};

describe('valueLine', () => {
  it('spells fold, label, held-out and signed residual, trials from 1', () => {
    expect(valueLine(data, 0)).toBe(
      'trial 1 · block 1 · fold 2 · label 0.25 · held-out 0.50 · residual +0.25',
    );
    expect(valueLine(data, 2)).toContain('residual −0.10');
  });
  it('says why a trial is left out', () => {
    expect(valueLine(data, 1)).toBe('trial 2 · block 1 · label missing · left out: room light on');
  });
});
