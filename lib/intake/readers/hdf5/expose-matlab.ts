import { toRowMajor } from '@/lib/intake/readers/to-row-major';
import { exposeDataset } from '@/lib/intake/readers/hdf5/expose-dataset';
import type { MountedHdf5 } from '@/lib/intake/readers/hdf5/mount-hdf5';
import { readDataset } from '@/lib/intake/readers/hdf5/read-dataset';
import type { ReadableArray } from '@/lib/intake/readers/readable-file';

const REFERENCE = 7;
const MAX_CELLS = 20_000;

/**
 * The arrays of one dataset of a MAT 7.3 file, whose axes stand in reverse order: names with dots for structs, `name{}` for
 * the cells of a cell array (or the elements of a struct array) that are alike.
 */
export function exposeMatlab(
  mounted: MountedHdf5,
  path: string,
  fileBytes: number,
  check: (path: string) => boolean,
): ReadableArray[] {
  const { module, fileId } = mounted;
  const name = path.slice(1).replaceAll('/', '.');
  const metadata = module.get_dataset_metadata(fileId, path);
  if (attribute(mounted, path, 'MATLAB_empty') !== null || metadata.shape === null) return [];
  const matlabClass = attribute(mounted, path, 'MATLAB_class');
  if (metadata.type === REFERENCE && metadata.total_size <= MAX_CELLS) {
    const isCell = matlabClass === 'cell';
    const targets: string[] = [];
    for (const slab of readDataset(mounted, path, metadata))
      for (let at = 0; at < slab.length; at += metadata.size)
        targets.push(module.get_referenced_name(fileId, slab.slice(at, at + metadata.size), true));
    if (!targets.every((target) => module.get_type(fileId, target) === module.H5G_DATASET && check(target)))
      return [];
    const items = targets.map((target) => exposeMatlab(mounted, target, fileBytes, check));
    const all = stack(items, isCell ? `${name}{}` : name);
    return all === null ? [] : [all];
  }
  const [array] = exposeDataset(mounted, path, metadata);
  if (array === undefined) return [];
  const shape = [...array.shape].reverse();
  if (matlabClass === 'char')
    return [
      {
        path: name,
        dtype: 'string',
        shape: [1],
        order: 'C',
        async *chunks() {
          let text = '';
          for await (const chunk of array.chunks())
            for (const unit of chunk) text += String.fromCharCode(Number(unit));
          yield [text];
        },
      },
    ];
  return [
    { ...array, path: name, dtype: matlabClass === 'logical' ? 'bool' : array.dtype, shape, order: 'F' },
  ];
}

/** One array over several that are alike, the first axis counting them; null where they are not. */
function stack(items: readonly ReadableArray[][], path: string): ReadableArray | null {
  const arrays = items.flatMap((item) => (item.length === 1 ? item : []));
  const [first] = arrays;
  if (first === undefined || arrays.length !== items.length) return null;
  if (!arrays.every((one) => one.dtype === first.dtype && one.shape.join() === first.shape.join()))
    return null;
  const inner =
    first.shape.length <= 2 && first.shape.some((length) => length === 1)
      ? first.shape.filter((length) => length !== 1)
      : first.shape;
  return {
    path,
    dtype: first.dtype,
    shape: [arrays.length, ...inner],
    order: 'C',
    async *chunks() {
      for (const array of arrays) {
        if (array.dtype === 'string') {
          yield* array.chunks();
          continue;
        }
        const values = new Float64Array(array.shape.reduce((product, length) => product * length, 1));
        let at = 0;
        for await (const chunk of array.chunks()) for (const value of chunk) values[at++] = Number(value);
        yield toRowMajor(values, array.shape);
      }
    },
  };
}

function attribute({ module, library, fileId }: MountedHdf5, path: string, name: string): unknown {
  if (!module.get_attribute_names(fileId, path).includes(name)) return null;
  return new library.Attribute(fileId, path, name).value;
}
