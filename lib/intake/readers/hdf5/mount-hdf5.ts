import type { ByteSource } from '@/lib/intake/byte-source';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';

type Library = typeof import('h5wasm');
type Module = Awaited<Library['ready']>;

/** An HDF5 file that is open in the library, with the library itself. */
export interface MountedHdf5 {
  library: Library;
  module: Module;
  fileId: bigint;
  close(): void;
}

const PAGE_BYTES = 512 * 1024;
const MAX_PAGES = 48;
let mounts = 0;

/**
 * Opens an HDF5 file in the WebAssembly library's own file system, which holds nothing but this one file: its bytes come
 * from the source by pages, and no path in the file can lead anywhere else. Failed reads throw.
 */
export async function mountHdf5(source: ByteSource): Promise<MountedHdf5> {
  const { readSync, sizeBytes } = source;
  if (readSync === undefined) throw new Error('HDF5 needs a source that can be read at once');
  const library = await import('h5wasm');
  const module = await library.ready;
  module.activate_throwing_error_handler();
  const name = `file-${mounts++}`;
  const files = module.FS;
  files.writeFile(name, new Uint8Array(0));
  const pages = new Map<number, Uint8Array>();
  const page = (at: number): Uint8Array => {
    let bytes = pages.get(at);
    if (bytes === undefined) {
      bytes = readSync(at * PAGE_BYTES, Math.min(PAGE_BYTES, sizeBytes - at * PAGE_BYTES));
      if (pages.size >= MAX_PAGES) pages.delete(pages.keys().next().value!);
    } else pages.delete(at);
    pages.set(at, bytes);
    return bytes;
  };
  const { node } = files.lookupPath(name, {}) as unknown as {
    node: { usedBytes: number; stream_ops: Record<string, unknown> };
  };
  node.usedBytes = sizeBytes;
  node.stream_ops = {
    ...node.stream_ops,
    read: (
      _stream: unknown,
      buffer: Uint8Array,
      offset: number,
      length: number,
      position: number,
    ): number => {
      const end = Math.min(position + length, sizeBytes);
      let at = position;
      while (at < end) {
        const bytes = page(Math.floor(at / PAGE_BYTES));
        const from = at % PAGE_BYTES;
        const n = Math.min(bytes.length - from, end - at);
        buffer.set(bytes.subarray(from, from + n), offset + at - position);
        at += n;
      }
      return Math.max(0, end - position);
    },
  };
  try {
    const fileId = module.open(
      name,
      module.H5F_ACC_RDONLY,
      false,
      module.H5F_LIBVER_EARLIEST,
      module.H5F_LIBVER_LATEST,
    );
    return {
      library,
      module,
      fileId,
      close: () => {
        pages.clear();
        try {
          module.close_file(fileId);
          files.unlink(name);
        } catch {
          // Closed already, or handles that a failed read left open: the process ends soon.
        }
      },
    };
  } catch {
    throw new IntakeRefusal(
      'hdf5-open',
      'The file begins like HDF5 but cannot be opened: it is damaged or was not closed.',
      'Close the file where it was written, and send it again.',
    );
  }
}
