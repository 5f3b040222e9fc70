import { describe, expect, it } from 'vitest';
import { recipeWords } from '@/components/recipe/recipe-words';
import { recipeSchema, type Recipe } from '@/lib/contracts/recipe';

const recipe: Recipe = recipeSchema.parse({
  label: 'shared-motion fraction',
  labelTransform: { kind: 'none' },
  trials: { all: true },
  units: { rule: { minRateHz: 1, minPresence: 0.9 } },
  exclusions: { version: 3 },
  window: { startMs: 80, endMs: 480 },
  features: 'windowMean',
  transform: 'sqrt',
  estimator: { kind: 'ridge', penalty: { choose: 'gcv' } },
  folds: { kind: 'contiguous', k: 5, purgeTrials: 6 },
  nuisance: { columns: [], handling: 'none' },
  null: { kind: 'within', column: 'block', draws: 1000 },
  controls: [],
  views: [],
  seed: 7,
});

describe('recipeWords', () => {
  it('names label, units, window, estimator, folds, choice, null and seed', () => {
    const words = recipeWords(recipe, { trialsUsed: 628, unitsUsed: 130 }, 'nominal');
    expect(words).toContain('The nominal shared-motion fraction was read out from 130\u00a0units');
    expect(words).toContain('(rate at least 1 spikes/s, presence at least 0.9)');
    expect(words).toContain('ridge regression on square-root mean rates 80 to 480 ms');
    expect(words).toContain('5 contiguous folds with a purge gap of 6\u00a0trials');
    expect(words).toContain(
      'the penalty was chosen by generalised cross-validation within the training trials',
    );
    expect(words).toContain('1\u00a0000\u00a0shuffles of the label within block');
    expect(words).toContain('Seed 7.');
  });

  it('says that no shuffles were run, and nothing of a penalty for least squares', () => {
    const words = recipeWords(
      { ...recipe, estimator: { kind: 'leastSquares' }, null: { kind: 'none' } },
      { trialsUsed: null, unitsUsed: null },
    );
    expect(words).toContain('No shuffled control was run.');
    expect(words).not.toContain('penalty');
  });
});
