import type { Column } from '@/lib/intake/column';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { CountsBuilder } from '@/lib/intake/mapping/counts-builder';
import { LongRows } from '@/lib/intake/mapping/long-rows';
import { numberRows } from '@/lib/intake/mapping/number-rows';
import type { ReadableTable } from '@/lib/intake/readers/readable-file';

export interface LongMapping {
  trial: string;
  unit: string;
  bin: string;
  count: string;
  shape?: [number, number, number];
  base?: 0 | 1;
}

/**
 * Counts from a table with one row a trial, unit and bin; an absent row is 0. Trials and units are matched by the
 * identifying columns of their tables where those have a column of the same name; otherwise they are numbers from `base`.
 */
export async function countsFromLong(
  table: ReadableTable,
  long: LongMapping,
  trials: readonly Column[],
  units: readonly Column[],
  fileName: string,
): Promise<CountsBuilder> {
  const rows = await LongRows.read(table, long, fileName);
  const place = { file: fileName };
  const nTrialRows = trials[0]?.values.length;
  const nUnitRows = units[0]?.values.length;
  const axes = (['trial', 'unit', 'bin'] as const).map((axis, at) => {
    const list = axis === 'trial' ? trials : axis === 'unit' ? units : [];
    const column = axis === 'bin' ? undefined : list.find((one) => one.name === long[axis]);
    if (column !== undefined && axis !== 'bin' && long.base === undefined) {
      const index = numberRows(column, axis, fileName);
      return { index: rows.match(at, index, axis, long[axis]), length: long.shape?.[at] ?? index.size };
    }
    const base = long.base ?? rows.tellBase(at, axis, long.shape?.[at]);
    const known = axis === 'trial' ? nTrialRows : axis === 'unit' ? nUnitRows : undefined;
    return {
      index: rows.number(at, base, axis, long[axis]),
      length: long.shape?.[at] ?? known ?? rows.largest(at) - base + 1,
    };
  });
  const shape: [number, number, number] = [axes[0].length, axes[1].length, axes[2].length];
  const builder = new CountsBuilder(shape, place);
  const filled = new Uint8Array(Math.ceil(builder.counts.length / 8));
  for (let row = 0; row < rows.nRows; row++) {
    const index = axes.map((axis) => axis.index[row]);
    const outside = index.findIndex((value, axis) => value >= shape[axis]);
    const line = rows.lines[row];
    if (outside !== -1)
      throw new IntakeRefusal(
        'long-outside',
        `Line ${line} names ${['trial', 'unit', 'bin'][outside]} ${rows.values[outside][row]}, outside the ${shape.join(' × ')} trials × units × bins.`,
        'Correct the shape, or say whether numbers start at 0 or 1.',
        { file: fileName, line },
      );
    const cell = (index[0] * shape[1] + index[1]) * shape[2] + index[2];
    if ((filled[cell >> 3] & (1 << (cell & 7))) !== 0)
      throw new IntakeRefusal(
        'long-duplicate',
        `Line ${line} gives a trial, unit and bin that came before.`,
        'Keep one row a trial, unit and bin.',
        { file: fileName, line },
      );
    filled[cell >> 3] |= 1 << (cell & 7);
    builder.set(cell, rows.values[3][row], { line });
  }
  return builder;
}
