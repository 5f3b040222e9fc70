import { AppError } from '@/lib/errors/app-error';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';

/** The refusal of a recipe, with every fault and its pointer. */
export function invalidRecipe(faults: RecipeFault[]): AppError {
  const more = faults.length > 1 ? ` (and ${faults.length - 1} more)` : '';
  return new AppError('invalid-input', `${faults[0].message}${more}`, {
    faults: faults.map(({ pointer, code, message }) => ({ pointer, code, detail: message })),
  });
}
