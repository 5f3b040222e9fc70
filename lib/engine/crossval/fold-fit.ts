import type { ScreenPlan } from '@/lib/engine/crossval/screen-plan';
import type { Candidate } from '@/lib/engine/estimators/candidates';
import type { SpectralFactor } from '@/lib/engine/estimators/spectral-factor';
import type { UnpenalisedBase } from '@/lib/engine/estimators/unpenalised-base';

/** A factorised training set with its candidates, ready for any label. */
export interface FactoredFold {
  factor: SpectralFactor;
  /** null: intercept alone. */
  base: UnpenalisedBase | null;
  /** Simplest first (largest penalty, fewest components). */
  candidates: Candidate[];
  /** Partial least squares makes its readouts from the label: most components; otherwise 0. */
  plsComponents: number;
  /** nTrain × kept features as they were factorised; only where the setup asks for it. */
  scaledTrain?: Float64Array;
  kept: Int32Array;
  mean: Float64Array;
  sd: Float64Array;
}

/** How a label's candidate is chosen on the training trials. */
export type Chooser =
  | { kind: 'fixed' }
  /** Candidate l scores Σᵢ (weights[l][i]·eᵢ)², e its training residuals; null where the score does not exist. */
  | {
      kind: 'closedForm';
      weights: (Float64Array | null)[];
      /** Made when first asked for: few labels need none. */
      screen: () => ScreenPlan | null;
    }
  /** Pooled squared error over inner folds; `train` and `test` index the outer training trials. */
  | { kind: 'inner'; folds: { train: Int32Array; test: Int32Array; fit: FactoredFold }[] };

/** One outer fold: everything but the labels. */
export interface FoldFit extends FactoredFold {
  chooser: Chooser;
  /** Whether the first and last candidate are edges of a grid. */
  isGrid: boolean;
  /** Features before dropping. */
  p: number;
  bytes: number;
}
