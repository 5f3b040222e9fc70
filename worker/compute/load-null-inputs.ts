import { labelSequences } from '@/lib/services/readouts/label-sequences';
import { permutationRows, readPermutations } from '@/lib/services/readouts/readout-inputs';
import type { NullInputs } from '@/lib/services/readouts/resolve-null';
import { objectStore } from '@/storage/object-store';
import type { ComputeRequest } from '@/worker/compute/messages';

/** What the null takes beside its recipe, from the recipe itself or from where it was put when the readout was made. */
export async function loadNullInputs({ recipe, inputsKey }: ComputeRequest): Promise<NullInputs> {
  const { kind, permutations } = recipe.null;
  if (kind === 'given' && Array.isArray(permutations)) return { permutations };
  if (inputsKey === null) return {};
  const bytes = await objectStore().getBytes(inputsKey);
  if (kind === 'given') return { permutations: permutationRows(readPermutations(bytes)) };
  return kind === 'sessions' ? { sequences: labelSequences.read(bytes) } : {};
}
