import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { findFile } from '@/lib/intake/mapping/find-file';
import type { SourceFiles } from '@/lib/intake/mapping/source-files';
import type { ReadableArray, ReadableFile } from '@/lib/intake/readers/readable-file';

/** A long list of spike times (seconds), and where each unit's part of it ends. */
export interface SpikeArrays {
  times: ReadableArray;
  ends: ReadableArray;
}

/** The spike times of a file's units table (NWB), or arrays of those names in any other set of arrays. */
export function findSpikeArrays(file: ReadableFile): SpikeArrays | null {
  for (const folder of ['/units/', '/', '', 'units.']) {
    const find = (name: string): ReadableArray | undefined =>
      file.arrays.find((array) => array.path === `${folder}${name}` && array.dtype !== 'string');
    const times = find('spike_times');
    const ends = find('spike_times_index');
    if (times !== undefined && ends !== undefined) return { times, ends };
  }
  return null;
}

/** The same, or a refusal that names the file. */
export function requireSpikeArrays(files: SourceFiles, fileId: string): SpikeArrays & { name: string } {
  const { file, name } = findFile(files, fileId, 'the spike times');
  const found = findSpikeArrays(file);
  if (found === null)
    throw new IntakeRefusal(
      'spike-times-none',
      `${name} has no spike_times with a spike_times_index.`,
      'Choose a file with a units table, or an array of counts.',
      { file: name },
    );
  return { ...found, name };
}
