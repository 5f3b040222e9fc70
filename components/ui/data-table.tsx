'use client';

import {
  createColumnHelper,
  createSortedRowModel,
  rowSortingFeature,
  sortFn_alphanumeric,
  sortFn_basic,
  tableFeatures,
  useTable,
} from '@tanstack/react-table';
import { useId, useMemo, type ReactNode } from 'react';

const features = tableFeatures({
  rowSortingFeature,
  sortedRowModel: createSortedRowModel(),
  sortFns: { alphanumeric: sortFn_alphanumeric, basic: sortFn_basic },
});

/** One column: what its head says, what a row shows, and the value that it sorts by. */
export interface TableColumn<Row> {
  key: string;
  head: string;
  /** In mono under the head; never inside cells. */
  unit?: string;
  /** Right-aligned mono figures. */
  numeric?: boolean;
  /** Makes the column sortable; null sorts last. */
  value?: (row: Row) => number | string | null;
  cell: (row: Row) => ReactNode;
  /** Replaces the words of the head, as for a common axis. The column can then not be sorted by its head. */
  headDrawing?: ReactNode;
  /** Class of the cells, as `iv` for an interval column. */
  className?: string;
  headClassName?: string;
  widthPx?: number;
}

/** A table whose heads sort it. Words left, numbers right; the default order is named by its head. */
export function DataTable<Row>({
  caption,
  columns,
  rows,
  rowKey,
  rowClass,
  sortBy,
  foot,
  className,
  minWidthPx,
}: {
  /** What the table holds; read out, and the name of the scrolling region. */
  caption: string;
  columns: readonly TableColumn<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  rowClass?: (row: Row) => string;
  sortBy?: { key: string; descending: boolean };
  foot?: ReactNode;
  className?: string;
  minWidthPx?: number;
}) {
  const captionId = useId();
  const definitions = useMemo(() => {
    const helper = createColumnHelper<typeof features, { row: Row }>();
    return helper.columns(
      columns.map((column) =>
        helper.accessor(({ row }: { row: Row }) => column.value?.(row) ?? undefined, {
          id: column.key,
          enableSorting: column.value !== undefined && column.headDrawing === undefined,
          sortFn: column.numeric ? 'basic' : 'alphanumeric',
          sortUndefined: 'last',
          sortDescFirst: false,
        }),
      ),
    );
  }, [columns]);
  const data = useMemo(() => rows.map((row) => ({ row })), [rows]);
  const table = useTable({
    features,
    columns: definitions,
    data,
    enableSortingRemoval: false,
    getRowId: ({ row }) => rowKey(row),
    initialState: { sorting: sortBy ? [{ id: sortBy.key, desc: sortBy.descending }] : [] },
  });
  return (
    <div className="scroll" tabIndex={0} role="region" aria-labelledby={captionId}>
      <table className={className} style={minWidthPx ? { minWidth: minWidthPx } : undefined}>
        <caption className="vh" id={captionId}>
          {caption}
        </caption>
        <thead>
          <tr>
            {columns.map((column) => {
              const model = table.getColumn(column.key);
              const sorted = model?.getIsSorted() ?? false;
              const words = (
                <>
                  {column.head}
                  {sorted && !column.unit ? <SortArrow descending={sorted === 'desc'} /> : null}
                  {column.unit ? (
                    <span className="u">
                      {column.unit}
                      {sorted ? <SortArrow descending={sorted === 'desc'} /> : null}
                    </span>
                  ) : null}
                </>
              );
              return (
                <th
                  key={column.key}
                  scope="col"
                  className={
                    [column.numeric ? 'num' : '', column.headClassName ?? ''].filter(Boolean).join(' ') ||
                    undefined
                  }
                  aria-sort={sorted ? (sorted === 'desc' ? 'descending' : 'ascending') : undefined}
                  style={column.widthPx ? { width: column.widthPx } : undefined}
                >
                  {column.headDrawing ??
                    (model?.getCanSort() ? (
                      <button type="button" onClick={() => model.toggleSorting()}>
                        {words}
                      </button>
                    ) : (
                      words
                    ))}
                </th>
              );
            })}
          </tr>
        </thead>
        <tbody>
          {table.getRowModel().rows.map((row) => (
            <tr key={row.id} className={rowClass?.(row.original.row)}>
              {columns.map((column) => (
                <td
                  key={column.key}
                  className={
                    [column.numeric ? 'n' : '', column.className ?? ''].filter(Boolean).join(' ') || undefined
                  }
                >
                  {column.cell(row.original.row)}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
        {foot ? <tfoot>{foot}</tfoot> : null}
      </table>
    </div>
  );
}

function SortArrow({ descending }: { descending: boolean }) {
  return (
    <svg className="sort-arrow" width="8" height="10" aria-hidden="true">
      <path
        d={descending ? 'M4 1v8M1 6l3 3l3 -3' : 'M4 9V1M1 4l3 -3l3 3'}
        fill="none"
        stroke="currentColor"
        strokeWidth="1.3"
      />
    </svg>
  );
}
