import type { Metadata } from 'h5wasm';
import { decodeValues } from '@/lib/intake/readers/decode-values';
import type { ElementType } from '@/lib/intake/readers/element-type';
import { datasetType } from '@/lib/intake/readers/hdf5/dataset-type';
import type { MountedHdf5 } from '@/lib/intake/readers/hdf5/mount-hdf5';
import { hdf5ReadRefusal, readDataset } from '@/lib/intake/readers/hdf5/read-dataset';
import type { ReadableArray, ValueChunk } from '@/lib/intake/readers/readable-file';

const STRING = 3;
const COMPOUND = 6;
const TEXTS_AT_ONCE = 5_000;
const MAX_TEXT_BYTES = 4096;

/** The arrays that one dataset gives: itself, or one a member for a compound; none for types that a session does not need. */
export function exposeDataset(mounted: MountedHdf5, path: string, metadata: Metadata): ReadableArray[] {
  const shape = metadata.shape;
  if (shape === null) return [];
  const type = datasetType(metadata);
  if (type !== null)
    return [
      {
        path,
        dtype: type.dtype,
        shape,
        order: 'C',
        chunks: () => decodeValues(slabsOf(mounted, path, metadata), type, path),
      },
    ];
  if (metadata.type === STRING && shape.length <= 1 && (metadata.vlen || metadata.size <= MAX_TEXT_BYTES))
    return [{ path, dtype: 'string', shape, order: 'C', chunks: () => readTexts(mounted, path, shape) }];
  if (metadata.type === COMPOUND && shape.length === 1)
    return (metadata.compound_type?.members ?? []).flatMap((member) => {
      const memberType = datasetType(member);
      const isScalar = (member.shape ?? []).length === 0;
      if (memberType === null || !isScalar) return [];
      const columnPath = `${path}.${member.name}`;
      const chunks = (): AsyncIterable<ValueChunk> =>
        decodeValues(membersOf(mounted, path, metadata, member.offset, memberType), memberType, columnPath);
      return [{ path: columnPath, dtype: memberType.dtype, shape, order: 'C' as const, chunks }];
    });
  return [];
}

async function* slabsOf(
  mounted: MountedHdf5,
  path: string,
  metadata: Metadata,
): AsyncGenerator<Uint8Array, void, undefined> {
  yield* readDataset(mounted, path, metadata);
}

async function* membersOf(
  mounted: MountedHdf5,
  path: string,
  metadata: Metadata,
  offset: number,
  type: ElementType,
): AsyncGenerator<Uint8Array, void, undefined> {
  for (const slab of readDataset(mounted, path, metadata)) {
    const n = slab.length / metadata.size;
    const own = new Uint8Array(n * type.itemBytes);
    for (let row = 0; row < n; row++) {
      const from = row * metadata.size + offset;
      own.set(slab.subarray(from, from + type.itemBytes), row * type.itemBytes);
    }
    yield own;
  }
}

async function* readTexts(
  mounted: MountedHdf5,
  path: string,
  shape: number[],
): AsyncGenerator<string[], void, undefined> {
  const dataset = new mounted.library.Dataset(mounted.fileId, path);
  const plain = (values: unknown): string[] =>
    (Array.isArray(values) ? values : [values]).map((value) => String(value ?? '').slice(0, MAX_TEXT_BYTES));
  try {
    if (shape.length === 0) yield plain(dataset.value);
    else
      for (let from = 0; from < shape[0]; from += TEXTS_AT_ONCE)
        yield plain(dataset.slice([[from, Math.min(shape[0], from + TEXTS_AT_ONCE)]]));
  } catch (error) {
    throw hdf5ReadRefusal(error, path);
  }
}
