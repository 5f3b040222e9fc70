import type { InnerAssignment } from '@/lib/engine/folds/inner-assignment';
import type { EstimatorSpec } from '@/lib/engine/readout/types';

/** Nuisance columns of the given training rows and of other rows, fitted (knots, means) on the training rows alone. */
export interface NuisanceDesign {
  cols: number;
  train: Float64Array;
  test: Float64Array;
}

/** Features in blocks of columns. Only for ridge in its dual form without nuisance. */
export interface WideFeatures {
  /** First and one past the last column of each block. */
  blocks: { from: number; to: number }[];
  /** A block's features, rows × (to − from). */
  features: (block: { from: number; to: number }) => Float64Array;
}

/** Everything that one fold's fit depends on, apart from the labels. */
export interface FoldSetup {
  /** Rows of features, p columns, row-major; `train` and `test` index its rows. Empty where `wide` is given. */
  x: Float64Array;
  /** Many more features than trials: they come in blocks of columns, so that they need not be held at once. */
  wide?: WideFeatures;
  p: number;
  /** Rows for held-out trials where they differ from `x`. */
  xTest?: Float64Array;
  train: Int32Array;
  test: Int32Array;
  estimator: EstimatorSpec;
  scaling: 'unit' | 'none';
  /** Nuisance beside the intercept; `order` says whether features are scaled before or after it is taken out. */
  nuisance?: {
    design: (train: Int32Array, test: Int32Array) => NuisanceDesign;
    order: 'scaleFirst' | 'residualiseFirst';
  };
  /** Inner folds over `train`'s positions; needed for the choice by inner folds. */
  inner?: () => InnerAssignment;
  /** Keep the scaled training features in the fit, for weights. */
  keepsScaled?: boolean;
  /** Session trial of each row, for inner purge gaps. */
  trials: Int32Array;
}
