import { z } from 'zod';

const inputsSchema = z.strictObject({ permutations: z.array(z.array(z.int().nonnegative())) });
/** The parts of a recipe that are too long for its row and lie in the object store instead. */
export type ReadoutInputs = z.infer<typeof inputsSchema>;

export function writeInputs(inputs: ReadoutInputs): Uint8Array {
  return new TextEncoder().encode(JSON.stringify(inputs));
}

export function readInputs(bytes: Uint8Array): ReadoutInputs {
  return inputsSchema.parse(JSON.parse(new TextDecoder().decode(bytes)));
}
