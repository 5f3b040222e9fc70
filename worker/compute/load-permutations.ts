import type { ComputeRequest } from '@/worker/compute/messages';
import { permutationRows, readPermutations } from '@/lib/services/readouts/readout-inputs';
import { objectStore } from '@/storage/object-store';

/** Given permutations, from the recipe or from where they were put when the recipe was too long; undefined without. */
export async function loadPermutations({
  recipe,
  inputsKey,
}: ComputeRequest): Promise<readonly ArrayLike<number>[] | undefined> {
  if (recipe.null.kind !== 'given') return undefined;
  if (Array.isArray(recipe.null.permutations)) return recipe.null.permutations;
  if (inputsKey === null) return undefined;
  return permutationRows(readPermutations(await objectStore().getBytes(inputsKey)));
}
