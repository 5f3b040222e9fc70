import type { Problem } from '@/lib/contracts/problem';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';

/** Faults of a recipe as problems of a readout that has been made already. */
export function recipeProblems(faults: RecipeFault[]): Problem[] {
  return faults.map(({ pointer, code, message, place }) => ({
    code,
    severity: 'stops',
    message,
    place: { path: pointer, ...place },
  }));
}
