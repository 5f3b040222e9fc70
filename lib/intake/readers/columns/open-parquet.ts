import { parquetMetadataAsync, parquetRead, parquetSchema } from 'hyparquet';
import { compressors } from 'hyparquet-compressors';
import type { ByteSource } from '@/lib/intake/byte-source';
import type { Problem } from '@/lib/contracts/problem';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { checkColumns } from '@/lib/intake/readers/columns/check-columns';
import { columnFile, type HeldColumn } from '@/lib/intake/readers/columns/column-file';
import { holdValues } from '@/lib/intake/readers/columns/hold-values';
import type { ReadableFile } from '@/lib/intake/readers/readable-file';

/** Opens a Parquet file: its columns of numbers and text, one value a row. */
export async function openParquet(source: ByteSource): Promise<ReadableFile> {
  const file = {
    byteLength: source.sizeBytes,
    slice: async (start: number, end = source.sizeBytes): Promise<ArrayBuffer> => {
      const bytes = await source.read(start, Math.min(end, source.sizeBytes) - start);
      return Uint8Array.from(bytes).buffer;
    },
  };
  const problems: Problem[] = [];
  try {
    const metadata = await parquetMetadataAsync(file);
    const names = parquetSchema(metadata).children.map((child) => child.element.name);
    const nRows = Number(metadata.num_rows);
    checkColumns('parquet', names, nRows);
    const columns: HeldColumn[] = [];
    for (const name of names) {
      const values: unknown[] = new Array<unknown>(nRows).fill(null);
      await parquetRead({
        file,
        metadata,
        compressors,
        columns: [name],
        onChunk: ({ columnData, rowStart }) => {
          for (let at = 0; at < columnData.length && rowStart + at < nRows; at++)
            values[rowStart + at] = columnData[at];
        },
      });
      const held = holdValues(name, values);
      if (held !== null) columns.push(held);
      else
        problems.push({
          code: 'parquet-left-aside',
          severity: 'notes',
          message: `Column “${name}” holds neither numbers nor text and is left aside.`,
          place: { path: name },
        });
    }
    if (columns.length === 0)
      throw new IntakeRefusal(
        'parquet-empty',
        'The file holds no column of numbers or text.',
        'Check the export.',
      );
    return columnFile('parquet', columns, problems);
  } catch (error) {
    if (error instanceof IntakeRefusal) throw error;
    throw new IntakeRefusal(
      'parquet-structure',
      `The Parquet file is damaged: ${(error as Error).message.slice(0, 120)}.`,
      'Write the file again.',
    );
  }
}
