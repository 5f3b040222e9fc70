'use client';
import { saveBlob } from '@/components/charts/save-blob';
import { toCsv, type Cell, type FigureColumn } from '@/components/charts/to-csv';
import { Button } from '@/components/ui/button';

/** The CSV of a table that is on the page already. `rows` is only made when asked for. */
export function SaveCsv({
  name,
  columns,
  rows,
  fileName,
}: {
  /** What the file holds, for the screen reader. */
  name: string;
  columns: readonly FigureColumn[];
  rows: () => readonly (readonly Cell[])[];
  fileName: string;
}) {
  return (
    <span className="get">
      <Button
        kind="link"
        onClick={() =>
          saveBlob(new Blob([toCsv(columns, rows())], { type: 'text/csv;charset=utf-8' }), `${fileName}.csv`)
        }
      >
        CSV<span className="vh">, {name}</span>
      </Button>
    </span>
  );
}
