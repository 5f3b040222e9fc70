import type { ByteSource } from '@/lib/intake/byte-source';
import { openArrow } from '@/lib/intake/readers/columns/open-arrow';
import { openJson } from '@/lib/intake/readers/columns/open-json';
import { openParquet } from '@/lib/intake/readers/columns/open-parquet';
import { openCsv } from '@/lib/intake/readers/csv/open-csv';
import { openHdf5 } from '@/lib/intake/readers/hdf5/open-hdf5';
import { openMat5 } from '@/lib/intake/readers/mat5/open-mat5';
import { openNpy } from '@/lib/intake/readers/npy/open-npy';
import { openNpz } from '@/lib/intake/readers/npz/open-npz';
import type { ReadableFile } from '@/lib/intake/readers/readable-file';
import { sniffFormat } from '@/lib/intake/readers/sniff-format';

const openers = {
  npy: openNpy,
  npz: openNpz,
  mat5: openMat5,
  hdf5: openHdf5,
  csv: openCsv,
  arrow: openArrow,
  parquet: openParquet,
  json: openJson,
} as const;

/**
 * Recognises and opens a member's file.
 * @throws IntakeRefusal where the file is of no known format, damaged, or not what it claims to be
 */
export async function openFile(source: ByteSource): Promise<ReadableFile> {
  return openers[await sniffFormat(source)](source);
}
