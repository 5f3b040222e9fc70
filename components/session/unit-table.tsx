'use client';
import { useMemo, useState } from 'react';
import { SaveCsv } from '@/components/session/save-csv';
import { sortUnits, type UnitSortKey } from '@/components/session/sort-units';
import styles from '@/components/session/unit-table.module.css';
import type { UnitRow } from '@/components/session/unit-row';
import { useWindowRows } from '@/components/session/use-window-rows';
import { formatCount } from '@/lib/format/format-count';
import { formatNumber } from '@/lib/format/format-number';
import { formatValue } from '@/lib/format/format-value';

const rowPx = 30;
const viewPx = 420;

interface Head {
  key: UnitSortKey;
  word: string;
  unit?: string;
  numeric: boolean;
}

/** The units of a session: sorted by any head, in or out by a tick. Long tables draw only the rows in sight. */
export function UnitTable({
  rows,
  columns,
  changing,
  onToggle,
  fileName,
}: {
  rows: readonly UnitRow[];
  columns: readonly { name: string; isNumeric: boolean }[];
  /** Units whose tick is about to change, not written yet. */
  changing: ReadonlySet<number>;
  /** Absent for members who may not leave units out. */
  onToggle?: (unit: number) => void;
  fileName: string;
}) {
  const [sort, setSort] = useState<{ key: UnitSortKey; descending: boolean }>({
    key: 'unit',
    descending: false,
  });
  const sorted = useMemo(() => sortUnits(rows, sort.key, sort.descending), [rows, sort]);
  const seen = useWindowRows(sorted.length, rowPx, viewPx);
  const heads: Head[] = [
    { key: 'unit', word: 'Unit', numeric: true },
    ...columns.map((column, place) => ({ key: place, word: column.name, numeric: column.isNumeric })),
    { key: 'rateHz', word: 'Rate', unit: 'spikes/s', numeric: true },
    { key: 'fano', word: 'Fano', numeric: true },
    { key: 'presence', word: 'Presence', unit: 'of trials', numeric: true },
    { key: 'out', word: 'Left out', numeric: false },
  ];
  const press = (key: UnitSortKey): void =>
    setSort((now) => ({
      key,
      descending: now.key === key ? !now.descending : key !== 'unit' && key !== 'out',
    }));
  const order = sort.descending ? 'descending' : 'ascending';
  const nColumns = heads.length + 1;
  return (
    <>
      <div
        className={`scroll ${styles.view}`}
        tabIndex={0}
        role="region"
        aria-label="Table of units"
        onScroll={seen.onScroll}
        style={{ maxHeight: viewPx + 40 }}
      >
        <table className="units" aria-rowcount={sorted.length + 1}>
          <caption className="vh">Units</caption>
          <thead>
            <tr>
              <th scope="col" style={{ width: 34 }}>
                <span className={onToggle ? undefined : 'vh'}>In</span>
              </th>
              {heads.map((head) => (
                <th
                  key={String(head.key)}
                  scope="col"
                  className={head.numeric ? 'num' : undefined}
                  aria-sort={sort.key === head.key ? order : undefined}
                >
                  <button type="button" onClick={() => press(head.key)}>
                    {head.word}
                    {sort.key === head.key && <Arrow descending={sort.descending} />}
                    {head.unit && <span className="u">{head.unit}</span>}
                  </button>
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {seen.before > 0 && <Spacer px={seen.before} columns={nColumns} />}
            {sorted.slice(seen.from, seen.to).map((row, offset) => {
              const isIn = (row.out === null) !== changing.has(row.unit);
              return (
                <tr
                  key={row.unit}
                  aria-rowindex={seen.from + offset + 2}
                  className={isIn ? 'flush' : 'flush out'}
                >
                  <td>
                    {onToggle && (
                      <input
                        type="checkbox"
                        checked={isIn}
                        onChange={() => onToggle(row.unit)}
                        aria-label={`unit ${row.unit + 1} in`}
                      />
                    )}
                  </td>
                  <td className="n" style={{ fontWeight: 600 }}>
                    {row.unit + 1}
                  </td>
                  {row.values.map((value, place) => (
                    <td key={columns[place].name} className={columns[place].isNumeric ? 'n' : undefined}>
                      {value === null ? '–' : typeof value === 'number' ? formatValue(value) : value}
                    </td>
                  ))}
                  <td className="n">{formatNumber(row.rateHz, 1)}</td>
                  <td className="n">{formatNumber(row.fano)}</td>
                  <td className="n">{formatNumber(row.presence)}</td>
                  <td
                    className="quiet"
                    title={row.out ? `${row.out.reason}, ${row.out.authorName}` : undefined}
                  >
                    <span className={styles.reason}>
                      {row.out ? `${row.out.reason}, ${row.out.authorName}` : ''}
                    </span>
                  </td>
                </tr>
              );
            })}
            {seen.after > 0 && <Spacer px={seen.after} columns={nColumns} />}
          </tbody>
        </table>
      </div>
      <p className="cap">
        <span className="n">{formatCount(rows.length)}</span> units. Rate, Fano factor (variance over mean of
        the spike count of a trial) and presence (share of trials with a spike) are over all trials and bins
        of the session; none of them looks at the label. – means that the value cannot be worked out.{' '}
        <SaveCsv
          name="units"
          fileName={`${fileName}-units`}
          columns={[
            { name: 'unit' },
            ...columns.map(({ name }) => ({ name })),
            { name: 'rate', unit: 'spikes/s' },
            { name: 'fano' },
            { name: 'presence' },
            { name: 'left out' },
          ]}
          rows={() =>
            sorted.map((row) => [
              row.unit + 1,
              ...row.values,
              row.rateHz,
              row.fano,
              row.presence,
              row.out?.reason ?? '',
            ])
          }
        />
      </p>
    </>
  );
}

function Spacer({ px, columns }: { px: number; columns: number }) {
  return (
    <tr aria-hidden="true" className="flush">
      <td colSpan={columns} style={{ height: px, padding: 0, border: 0 }} />
    </tr>
  );
}

function Arrow({ descending }: { descending: boolean }) {
  return (
    <svg className="sort-arrow" width="8" height="10" aria-hidden="true" style={{ marginLeft: 4 }}>
      <path
        d={descending ? 'M4 1v8M1 6l3 3l3 -3' : 'M4 9V1M1 4l3 -3l3 3'}
        fill="none"
        stroke="currentColor"
        strokeWidth="1.3"
      />
    </svg>
  );
}
