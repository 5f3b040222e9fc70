import { tableFromIPC } from 'apache-arrow';
import type { StimulusVelocity } from '@/lib/intake/session-data';

/** The velocities of a stimulus part (the bytes of its Arrow IPC file). */
export function readStimulus(bytes: Uint8Array): StimulusVelocity {
  const table = tableFromIPC(bytes);
  const fact = (name: string): number => Number(table.schema.metadata.get(`outfold.${name}`));
  const velocity = table.getChildAt(0)?.data[0]?.children[0]?.values as
    Float32Array | Float64Array | undefined;
  if (velocity === undefined) throw new Error('the stimulus part holds no velocities');
  return {
    velocity,
    nLocations: fact('nLocations'),
    nAxes: fact('nAxes'),
    nFrames: fact('nFrames'),
    frameMs: fact('frameMs'),
  };
}
