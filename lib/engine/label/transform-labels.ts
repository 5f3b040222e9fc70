import { EngineError } from '@/lib/engine/engine-error';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/** A fixed function of the label. Rank or z over all trials are no option: they would be fitted on held-out trials. */
export type LabelTransform =
  | { kind: 'none' }
  | { kind: 'log' }
  /** `epsilon` in (0, 0.5): values are first held within [ε, 1 − ε]. */
  | { kind: 'logit'; epsilon: number };

/**
 * A label under a fixed transform.
 *
 * none: y; log: ln y; logit: ln(c/(1 − c)), c = y held within [ε, 1 − ε].
 * Shapes: `label` n → n. Mutates nothing. Throws EngineError (with the trial) for a value that is not finite, a value at or
 * below 0 under log, outside [0, 1] under logit, or ε outside (0, 0.5). Cost: one pass. Source: definitions.
 */
export function transformLabels(label: ArrayLike<number>, transform: LabelTransform): Float64Array {
  requireNumbers('The label', label);
  if (transform.kind === 'none') return Float64Array.from(label);
  const out = new Float64Array(label.length);
  if (transform.kind === 'log') {
    for (let i = 0; i < label.length; i += 1) {
      if (!(label[i] > 0)) {
        throw new EngineError('notEstimable', `The label is ${label[i]} at trial ${i + 1}: no logarithm`, {
          trial: i,
        });
      }
      out[i] = Math.log(label[i]);
    }
    return out;
  }
  const { epsilon } = transform;
  if (!(epsilon > 0 && epsilon < 0.5)) {
    throw new EngineError('invalidOption', `ε must lie between 0 and 0.5, not at ${epsilon}`);
  }
  for (let i = 0; i < label.length; i += 1) {
    if (!(label[i] >= 0 && label[i] <= 1)) {
      throw new EngineError(
        'notEstimable',
        `The label is ${label[i]} at trial ${i + 1}: logit needs 0 to 1`,
        { trial: i },
      );
    }
    const held = Math.min(1 - epsilon, Math.max(epsilon, label[i]));
    out[i] = Math.log(held / (1 - held));
  }
  return out;
}
