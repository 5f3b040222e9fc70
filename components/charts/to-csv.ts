/** One value of a figure's table: null is an empty cell. */
export type Cell = string | number | null;

/** A column of the table that stands for a figure. `unit` joins the head in the CSV. */
export interface FigureColumn {
  name: string;
  unit?: string;
  /** Decimals on the page; the CSV always has the full number. */
  decimals?: number;
}

function csvCell(cell: Cell): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return Number.isFinite(cell) ? String(cell) : '';
  // A text that a spreadsheet would take for a formula gets a leading apostrophe.
  const safe = /^[=+\-@\t\r]/.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/**
 * CSV (RFC 4180, CRLF) of a figure's numbers. Numbers keep full precision with a point; missing is empty.
 * Text that begins like a spreadsheet formula is defused.
 */
export function toCsv(columns: readonly FigureColumn[], rows: readonly (readonly Cell[])[]): string {
  const head = columns.map((column) =>
    csvCell(column.unit ? `${column.name} (${column.unit})` : column.name),
  );
  return [head.join(','), ...rows.map((row) => row.map(csvCell).join(','))].join('\r\n') + '\r\n';
}
