import type { Metadata } from 'h5wasm';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { MountedHdf5 } from '@/lib/intake/readers/hdf5/mount-hdf5';

const SLAB_BYTES = 4 * 1024 * 1024;
const MAX_SLAB_BYTES = 64 * 1024 * 1024;

/**
 * A dataset's bytes in row-major order, in slabs along its first axis that fit its chunks, so that no chunk is unpacked
 * twice. `columns` of a compound come as whole records.
 */
export function* readDataset(
  mounted: MountedHdf5,
  path: string,
  metadata: Metadata,
): Generator<Uint8Array, void, undefined> {
  const shape = metadata.shape ?? [];
  if (metadata.total_size === 0) return;
  if (shape.length === 0) {
    yield readSlab(mounted, path, metadata.size, null, null);
    return;
  }
  const rowBytes = shape.slice(1).reduce((product, length) => product * length, metadata.size);
  const chunkRows = metadata.chunks?.[0] ?? 1;
  const fitting = Math.max(1, Math.floor(SLAB_BYTES / rowBytes / chunkRows)) * chunkRows;
  const rows = Math.min(fitting, Math.max(1, Math.floor(MAX_SLAB_BYTES / rowBytes)));
  if (rowBytes > MAX_SLAB_BYTES)
    throw new IntakeRefusal(
      'hdf5-row',
      `One row of “${path}” has ${rowBytes} bytes; at most 64 MiB are read at once.`,
      'Store the array with more, shorter rows.',
      { path },
    );
  for (let from = 0; from < shape[0]; from += rows) {
    const n = Math.min(rows, shape[0] - from);
    const count = [BigInt(n), ...shape.slice(1).map(BigInt)];
    const offset = shape.map((_, axis) => (axis === 0 ? BigInt(from) : 0n));
    yield readSlab(mounted, path, n * rowBytes, count, offset);
  }
}

function readSlab(
  { module, fileId }: MountedHdf5,
  path: string,
  nBytes: number,
  count: bigint[] | null,
  offset: bigint[] | null,
): Uint8Array {
  const pointer = module._malloc(nBytes);
  if (pointer === 0) throw new Error('the library has no memory left');
  try {
    const strides = count === null ? null : count.map(() => 1n);
    module.get_dataset_data(fileId, path, count, offset, strides, BigInt(pointer));
    return module.HEAPU8.slice(pointer, pointer + nBytes);
  } catch (error) {
    throw hdf5ReadRefusal(error, path);
  } finally {
    module._free(pointer);
  }
}

/** What the library says of a read that failed, as a refusal: data kept in another file, or damage. */
export function hdf5ReadRefusal(error: unknown, path: string): IntakeRefusal {
  if (error instanceof IntakeRefusal) return error;
  if (/external/i.test((error as Error).message))
    return new IntakeRefusal(
      'hdf5-external-storage',
      `The values of “${path}” are kept in another file. Such are never read.`,
      'Copy the values into the file.',
      { path },
    );
  return new IntakeRefusal(
    'hdf5-damaged',
    `The values of “${path}” cannot be read: the file is damaged there.`,
    'The file was damaged on its way or was not closed: copy or write it again.',
    { path },
  );
}
