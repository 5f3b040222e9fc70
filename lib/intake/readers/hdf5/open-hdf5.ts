import type { ByteSource } from '@/lib/intake/byte-source';
import type { Problem } from '@/lib/contracts/problem';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { checkDataset } from '@/lib/intake/readers/hdf5/check-dataset';
import { exposeDataset } from '@/lib/intake/readers/hdf5/expose-dataset';
import { exposeMatlab } from '@/lib/intake/readers/hdf5/expose-matlab';
import { mountHdf5, type MountedHdf5 } from '@/lib/intake/readers/hdf5/mount-hdf5';
import { walkHdf5 } from '@/lib/intake/readers/hdf5/walk-hdf5';
import type { ReadableArray, ReadableFile } from '@/lib/intake/readers/readable-file';

/** Opens an HDF5 file: plain, MAT 7.3 (told by its user block) or NWB (told by its root's attribute). */
export async function openHdf5(source: ByteSource): Promise<ReadableFile> {
  const head = await source.read(0, Math.min(128, source.sizeBytes));
  const isMatlab = Buffer.from(head).toString('latin1').startsWith('MATLAB 7.3');
  const mounted = await mountHdf5(source);
  try {
    const format = isMatlab ? 'mat73' : isNwb(mounted) ? 'nwb' : 'hdf5';
    const { arrays, problems } = listArrays(mounted, source.sizeBytes, isMatlab);
    if (arrays.length === 0)
      throw new IntakeRefusal(
        'hdf5-empty',
        'The file holds no array of numbers or text.',
        'Check which file holds the session.',
      );
    return { format, arrays, problems, close: () => mounted.close() };
  } catch (error) {
    mounted.close();
    if (error instanceof IntakeRefusal) throw error;
    // Anything that the library itself says about the structure is damage of the file.
    if (
      error instanceof Error &&
      /HDF5|H5|offset is out of bounds|Invalid typed array|memory access/i.test(error.message)
    )
      throw new IntakeRefusal(
        'hdf5-structure',
        'The file is damaged: its structure cannot be read.',
        'Copy or write the file again.',
      );
    throw error;
  }
}

function isNwb({ module, fileId }: MountedHdf5): boolean {
  return module.get_attribute_names(fileId, '/').includes('nwb_version');
}

function listArrays(
  mounted: MountedHdf5,
  fileBytes: number,
  isMatlab: boolean,
): { arrays: ReadableArray[]; problems: Problem[] } {
  const { module, fileId } = mounted;
  const { objects, problems } = walkHdf5(mounted, (path) => isMatlab && /^\/#(refs|subsystem)#/.test(path));
  const leftAside = (path: string, why: string): void => {
    problems.push({
      code: 'hdf5-left-aside',
      severity: 'notes',
      message: `“${path}” is left aside: ${why}.`,
      place: { path },
    });
  };
  const check = (path: string): boolean => {
    const filter = checkDataset(mounted, path, module.get_dataset_metadata(fileId, path), fileBytes);
    if (filter !== null) leftAside(path, `it is packed by the filter ${filter}, which is not read`);
    return filter === null;
  };
  const arrays: ReadableArray[] = [];
  for (const { path, kind } of objects) {
    if (kind !== 'dataset' || !check(path)) continue;
    const own = isMatlab
      ? exposeMatlab(mounted, path, fileBytes, check)
      : exposeDataset(mounted, path, module.get_dataset_metadata(fileId, path));
    if (own.length === 0) leftAside(path, 'its type is not one that a session needs');
    arrays.push(...own);
  }
  return { arrays, problems };
}
