import type { ByteSource } from '@/lib/intake/byte-source';
import { decodeValues } from '@/lib/intake/readers/decode-values';
import { npyHeaderProbeBytes, parseNpyHeader } from '@/lib/intake/readers/npy/parse-npy-header';
import type { ReadableFile } from '@/lib/intake/readers/readable-file';
import { streamBytes } from '@/lib/intake/readers/stream-bytes';

/** Opens an NPY file: one array, whose path is the empty string. */
export async function openNpy(source: ByteSource): Promise<ReadableFile> {
  const head = await source.read(0, Math.min(source.sizeBytes, npyHeaderProbeBytes));
  const header = parseNpyHeader(head, source.sizeBytes, '');
  const { headerBytes, dataBytes } = header;
  return {
    format: 'npy',
    arrays: [
      {
        path: '',
        dtype: header.dtype,
        shape: header.shape,
        order: header.order,
        chunks: () => decodeValues(streamBytes(source, headerBytes, headerBytes + dataBytes), header, ''),
      },
    ],
    problems: [],
    close: () => undefined,
  };
}
