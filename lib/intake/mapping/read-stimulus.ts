import type { Intake } from '@/lib/contracts/intake';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { findArray } from '@/lib/intake/mapping/find-array';
import { scatterCells } from '@/lib/intake/mapping/scatter-cells';
import type { SourceFiles } from '@/lib/intake/mapping/source-files';
import type { StimulusVelocity } from '@/lib/intake/session-data';

const MAX_BYTES = 128 * 1024 * 1024;

/** Reads the velocities, whose axes are named in the file's order, into trials × locations × axes × frames. */
export async function readStimulus(
  files: SourceFiles,
  source: NonNullable<Intake['stimulus']>,
  nTrials: number,
): Promise<StimulusVelocity> {
  const { fileId, path, axes } = source.velocity;
  const { array, name } = findArray(files, fileId, path, 'the stimulus');
  const place = { file: name, path };
  if (array.dtype === 'string')
    throw new IntakeRefusal(
      'stimulus-not-numeric',
      'The array chosen as velocities holds text.',
      'Choose an array of numbers.',
      place,
    );
  if (new Set(axes).size !== 4 || array.shape.length !== 4)
    throw new IntakeRefusal(
      'stimulus-axes',
      `The velocities are ${array.shape.join(' × ')}, with the axes named ${axes.join(', ')}; they need trial, location, axis and frame, each once.`,
      'Choose an array with four axes and name each once.',
      place,
    );
  const lengthOf = (axis: (typeof axes)[number]): number => array.shape[axes.indexOf(axis)];
  const [nLocations, nAxes, nFrames] = [lengthOf('location'), lengthOf('axis'), lengthOf('frame')];
  if (lengthOf('trial') !== nTrials)
    throw new IntakeRefusal(
      'stimulus-trials',
      `The velocities have ${lengthOf('trial')} trials, the trial table has ${nTrials}.`,
      'Send the stimulus that belongs to these trials, or name its axes in another order.',
      place,
    );
  const size = nTrials * nLocations * nAxes * nFrames;
  const isSingle = array.dtype === 'float32' || array.dtype === 'float16';
  if (size * (isSingle ? 4 : 8) > MAX_BYTES)
    throw new IntakeRefusal(
      'stimulus-too-large',
      `The velocities are ${array.shape.join(' × ')}, more than 128 MiB.`,
      'Send them with wider frames or as 32-bit numbers.',
      place,
    );
  const velocity = isSingle ? new Float32Array(size) : new Float64Array(size);
  const strideOf = {
    trial: nLocations * nAxes * nFrames,
    location: nAxes * nFrames,
    axis: nFrames,
    frame: 1,
  };
  let bad = -1;
  await scatterCells(
    array,
    axes.map((axis) => strideOf[axis]),
    (cell, value) => {
      velocity[cell] = value;
      if (!Number.isFinite(value) && bad === -1) bad = cell;
    },
  );
  if (bad !== -1)
    throw new IntakeRefusal(
      'stimulus-not-finite',
      'A velocity is missing or infinite; the trial of the first is given.',
      'Correct the export: every frame needs a velocity in deg/s.',
      { ...place, trial: Math.floor(bad / strideOf.trial) },
    );
  return { velocity, nLocations, nAxes, nFrames, frameMs: source.frameMs };
}
