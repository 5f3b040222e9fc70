import type { DataTable } from '@/lib/contracts/data-table';
import type { Column } from '@/lib/intake/column';
import type { Ctx } from '@/lib/services/context';
import { loadTables } from '@/lib/services/intake/load-session-data';

/** A session's trial or unit table with its derived columns, as plain values. */
export async function getDataTable(
  ctx: Ctx,
  input: { sessionId: string; dataVersion?: number; table: 'trials' | 'units' },
): Promise<DataTable> {
  const { version, trials, units, derived } = await loadTables(ctx, input);
  const number = (name: string, values: Float64Array): Column => ({ name, type: 'number', values });
  const [own, added] =
    input.table === 'trials'
      ? [trials, [number('totalCount', derived.trialTotals)]]
      : [
          units,
          [
            number('meanRateHz', derived.meanRateHz),
            number('presence', derived.presence),
            number('fano', derived.fano),
          ],
        ];
  return {
    dataVersion: version.number,
    dataHash: version.data_hash,
    nRows: input.table === 'trials' ? version.n_trials : version.n_units,
    columns: [
      ...own.map((column) => toPlain(column, false)),
      ...added.map((column) => toPlain(column, true)),
    ],
  };
}

function toPlain(column: Column, isDerived: boolean): DataTable['columns'][number] {
  return {
    name: column.name,
    type: column.type,
    ...(column.type === 'circular' && column.periodDeg !== undefined ? { periodDeg: column.periodDeg } : {}),
    isDerived,
    values: Array.from<number | string | null>(column.values).map((value) =>
      typeof value === 'number' && !Number.isFinite(value) ? null : value,
    ),
  };
}
