import type { Metadata } from 'h5wasm';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { MountedHdf5 } from '@/lib/intake/readers/hdf5/mount-hdf5';

const MAX_CHUNK_BYTES = 16 * 1024 * 1024;
const BOMB_MIN_BYTES = 256 * 1024 * 1024;
const BOMB_RATIO = 200;
/** deflate, shuffle, fletcher32 */
const READABLE_FILTERS = new Set([1, 2, 3]);

/**
 * Refuses datasets that reach into other files or claim more than they can hold; names the filter where one is not known
 * (null where all is well).
 */
export function checkDataset(
  { module, fileId }: MountedHdf5,
  path: string,
  metadata: Metadata,
  fileBytes: number,
): string | null {
  const refuse = (code: string, message: string, remedy: string): never => {
    throw new IntakeRefusal(code, message, remedy, { path });
  };
  if (metadata.virtual_sources !== undefined)
    refuse(
      'hdf5-virtual',
      `“${path}” is a virtual dataset, made of other datasets or files. Such are never read.`,
      'Copy the values into a dataset of their own.',
    );
  const filters = module.get_dataset_filters(fileId, path);
  const chunkBytes = (metadata.chunks ?? [0]).reduce((product, length) => product * length, metadata.size);
  if (chunkBytes > MAX_CHUNK_BYTES)
    refuse(
      'hdf5-chunk',
      `“${path}” is stored in chunks of ${chunkBytes} bytes; at most 16 MiB are read.`,
      'Store it in smaller chunks.',
    );
  const totalBytes = metadata.total_size * metadata.size;
  if (
    !Number.isSafeInteger(totalBytes) ||
    (totalBytes > BOMB_MIN_BYTES && totalBytes > BOMB_RATIO * fileBytes)
  )
    refuse(
      'hdf5-bomb',
      `“${path}” claims ${(metadata.shape ?? []).join(' × ')} values, far more than the file's ${fileBytes} bytes can hold.`,
      'If the array is real, write its values out.',
    );
  const unknown = filters.find((filter) => !READABLE_FILTERS.has(filter.id));
  const isDoubled = new Set(filters.map((filter) => filter.id)).size !== filters.length;
  if (isDoubled)
    refuse('hdf5-filter', `“${path}” goes through the same filter twice.`, 'Store it with one compression.');
  return unknown === undefined ? null : unknown.name || `number ${unknown.id}`;
}
