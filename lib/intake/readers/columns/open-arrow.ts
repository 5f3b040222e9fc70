import { CompressionType, compressionRegistry, tableFromIPC, type Table } from 'apache-arrow';
import { decompressZstd } from 'hyparquet-compressors';
import type { ByteSource } from '@/lib/intake/byte-source';
import type { Problem } from '@/lib/contracts/problem';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { checkColumns } from '@/lib/intake/readers/columns/check-columns';
import { columnFile, type HeldColumn } from '@/lib/intake/readers/columns/column-file';
import { holdValues } from '@/lib/intake/readers/columns/hold-values';
import { inflateLz4Frame } from '@/lib/intake/readers/columns/inflate-lz4-frame';
import type { ReadableFile } from '@/lib/intake/readers/readable-file';

const MAX_BYTES = 128 * 1024 * 1024;

compressionRegistry.set(CompressionType.ZSTD, { decode: (data) => decompressZstd(data) });
compressionRegistry.set(CompressionType.LZ4_FRAME, { decode: inflateLz4Frame });

/** Opens an Arrow IPC file or a Feather (version 2) file: its columns of numbers and text. */
export async function openArrow(source: ByteSource): Promise<ReadableFile> {
  if (source.sizeBytes > MAX_BYTES)
    throw new IntakeRefusal(
      'arrow-too-large',
      `The file has ${source.sizeBytes} bytes; Arrow files are read up to 128 MiB.`,
      'Send the counts as an array (NPY, NPZ or HDF5).',
    );
  const bytes = await source.read(0, source.sizeBytes);
  const problems: Problem[] = [];
  try {
    const table: Table = tableFromIPC(bytes);
    const names = table.schema.fields.map((field) => field.name);
    checkColumns('arrow', names, table.numRows);
    const columns = names.flatMap((name, at): HeldColumn[] => {
      const vector = table.getChildAt(at);
      const held = vector === null ? null : holdValues(name, Array.from(vector as Iterable<unknown>));
      if (held !== null && held.values.length === table.numRows) return [held];
      problems.push({
        code: 'arrow-left-aside',
        severity: 'notes',
        message: `Column “${name}” holds neither numbers nor text and is left aside.`,
        place: { path: name },
      });
      return [];
    });
    if (columns.length === 0)
      throw new IntakeRefusal(
        'arrow-empty',
        'The file holds no column of numbers or text.',
        'Check the export.',
      );
    return columnFile('arrow', columns, problems);
  } catch (error) {
    if (error instanceof IntakeRefusal) throw error;
    throw new IntakeRefusal(
      'arrow-structure',
      `The Arrow file is damaged: ${(error as Error).message.slice(0, 120)}.`,
      'Write the file again.',
    );
  }
}
