import type { CountsSource } from '@/lib/contracts/intake';
import type { Column } from '@/lib/intake/column';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { CountsBuilder } from '@/lib/intake/mapping/counts-builder';
import { countsFromArray } from '@/lib/intake/mapping/counts-from-array';
import { countsFromLong } from '@/lib/intake/mapping/counts-from-long';
import { countsFromSpikes } from '@/lib/intake/mapping/counts-from-spikes';
import { countsFromWide } from '@/lib/intake/mapping/counts-from-wide';
import { findArray } from '@/lib/intake/mapping/find-array';
import { findFile } from '@/lib/intake/mapping/find-file';
import type { SourceFiles } from '@/lib/intake/mapping/source-files';
import type { ReadableTable } from '@/lib/intake/readers/readable-file';

/** Reads the spike counts from wherever the mapping says they are. */
export async function readCounts(
  files: SourceFiles,
  source: CountsSource,
  tables: { trials: readonly Column[]; units: readonly Column[] },
  binWidthMs: number,
): Promise<{ builder: CountsBuilder; fileName: string; arrayType: string | null }> {
  if ('axes' in source) {
    const { array, name } = findArray(files, source.fileId, source.path, 'the counts');
    const builder = await countsFromArray(array, source.axes, name);
    return { builder, fileName: name, arrayType: array.dtype };
  }
  const { file, name } = findFile(files, source.fileId, 'the counts');
  if ('spikeTimes' in source) {
    const builder = await countsFromSpikes(
      files,
      source.fileId,
      source.spikeTimes,
      binWidthMs,
      tables.trials,
    );
    return { builder, fileName: name, arrayType: null };
  }
  const table = textTable(file.table, name);
  const builder =
    'wide' in source
      ? await countsFromWide(table, source.wide, tables.trials, name)
      : await countsFromLong(table, source.long, tables.trials, tables.units, name);
  return { builder, fileName: name, arrayType: null };
}

function textTable(table: ReadableTable | undefined, name: string): ReadableTable {
  if (table === undefined)
    throw new IntakeRefusal(
      'not-a-table',
      `${name} is a set of arrays, not a table.`,
      'Choose an array and name its axes.',
      { file: name },
    );
  return table;
}
