import { EngineError } from '@/lib/engine/engine-error';

/**
 * The smallest p value that a permutation test could have given.
 *
 * max(1/(B + 1), 1/N), N the number of distinct arrangements of the labels under the scheme; with only a few
 * arrangements no number of draws helps. Give the natural logarithm of N, for N itself overflows at a few hundred trials.
 * Shapes: `draws` B ≥ 1; `logArrangements` ln N ≥ 0, null where it is not known. Mutates nothing.
 * Throws EngineError outside these ranges. Cost: constant.
 * Source: Phipson & Smyth, Stat. Appl. Genet. Mol. Biol. 2010.
 */
export function smallestP(draws: number, logArrangements: number | null): number {
  if (!Number.isInteger(draws) || draws < 1) {
    throw new EngineError('invalidOption', `The number of draws must be whole and positive, not ${draws}`);
  }
  if (logArrangements !== null && !(logArrangements >= 0)) {
    throw new EngineError('invalidOption', 'There must be at least one arrangement of the labels');
  }
  const byDraws = 1 / (draws + 1);
  return logArrangements === null ? byDraws : Math.max(byDraws, Math.exp(-logArrangements));
}
