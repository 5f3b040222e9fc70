import type { EstimatorRecipe } from '@/lib/contracts/recipe';

const names: Record<EstimatorRecipe['kind'], string> = {
  leastSquares: 'least squares',
  ridge: 'ridge regression',
  pcr: 'principal-component regression',
  pls: 'partial least squares',
};

/** Name of an estimator in the middle of a sentence. */
export function estimatorWords(kind: EstimatorRecipe['kind']): string {
  return names[kind];
}
