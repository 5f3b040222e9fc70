import { chartNumber } from '@/components/charts/chart-number';
import styles from '@/components/charts/figure.module.css';
import type { Cell, FigureColumn } from '@/components/charts/to-csv';

function shown(cell: Cell, decimals: number | undefined): string {
  if (cell === null) return '–';
  if (typeof cell === 'string') return cell;
  return Number.isInteger(cell) && decimals === undefined
    ? chartNumber(cell, 0)
    : chartNumber(cell, decimals ?? 3);
}

/** The numbers of a figure as a table, in its own scrolling region with a fixed head. */
export function FigureTable({
  title,
  columns,
  rows,
}: {
  title: string;
  columns: readonly FigureColumn[];
  rows: readonly (readonly Cell[])[];
}) {
  const numeric = columns.map((_, index) => rows.some((row) => typeof row[index] === 'number'));
  return (
    <div className={`scroll ${styles.table}`} tabIndex={0} role="region" aria-label={`Table: ${title}`}>
      <table>
        <caption className="vh">{title}</caption>
        <thead>
          <tr>
            {columns.map((column, index) => (
              <th key={column.name} scope="col" className={numeric[index] ? 'num' : undefined}>
                {column.name}
                {column.unit && <span className="u">{column.unit}</span>}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row, rowIndex) => (
            <tr key={rowIndex}>
              {row.map((cell, index) => (
                <td key={columns[index].name} className={numeric[index] ? 'n' : undefined}>
                  {shown(cell, columns[index].decimals)}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
