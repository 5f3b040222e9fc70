import { deserialize, serialize } from 'node:v8';
import type { ChunkOutput } from '@/lib/engine/readout/types';

/** A chunk's output as bytes that keep every bit, to be kept in the database until the readout is done. */
export function encodeOutput(output: ChunkOutput): Uint8Array {
  return serialize(output);
}

/** The output again; throws where the bytes are not one. */
export function decodeOutput(bytes: Uint8Array): ChunkOutput {
  const output = deserialize(bytes) as ChunkOutput;
  if (typeof output?.id !== 'number' || typeof output.values !== 'object')
    throw new Error('a kept part of a readout cannot be read');
  return output;
}
