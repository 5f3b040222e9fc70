import { logFactorial } from '@/lib/engine/measures/log-factorial';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Natural logarithm of the number of distinct label sequences that shuffling can give.
 *
 * Σ over blocks [ln m! − Σ over the block's levels ln m_level!]; one block is the free shuffle, the levels of a column
 * are the blocks of a shuffle within that column.
 * Shapes: `label` n; `block` n codes, or null for one block. Mutates nothing. Result ≥ 0.
 * Throws EngineError on unequal lengths or values that are not finite. Cost: n log n.
 * Source: multinomial coefficients.
 */
export function logArrangements(label: ArrayLike<number>, block: ArrayLike<number> | null): number {
  const n = label.length;
  requireNumbers('The label', label);
  if (block !== null) requireNumbers('The block', block, n);
  const order = Array.from({ length: n }, (_, i) => i);
  const of = (i: number): number => (block === null ? 0 : block[i]);
  order.sort((a, b) => of(a) - of(b) || label[a] - label[b]);
  let total = 0;
  let blockStart = 0;
  let levelStart = 0;
  for (let i = 1; i <= n; i += 1) {
    const isNewBlock = i === n || of(order[i]) !== of(order[i - 1]);
    if (isNewBlock || label[order[i]] !== label[order[i - 1]]) {
      total -= logFactorial(i - levelStart);
      levelStart = i;
    }
    if (isNewBlock) {
      total += logFactorial(i - blockStart);
      blockStart = i;
    }
  }
  return Math.max(0, total);
}
