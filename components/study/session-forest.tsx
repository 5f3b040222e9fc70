'use client';

import { useMemo, useState } from 'react';
import { IntervalAxis } from '@/components/charts/interval-axis';
import { sharedAxis } from '@/components/charts/shared-axis';
import { AnimalShape } from '@/components/study/animal-shape';
import type { ForestGroup, ForestRow } from '@/components/study/forest-row';
import { forestColumns, type ForestColumn } from '@/components/study/forest-columns';
import { PickSelect } from '@/components/ui/pick-select';
import { numbers } from '@/components/ui/numbers';
import { formatPlural } from '@/lib/format/format-plural';
import { useWidth } from '@/components/charts/use-width';

const wideGlyphPx = 330;

function readoutOf(row: ForestRow, label: string) {
  return row.readouts.find((readout) => readout.label === label) ?? null;
}

/** The sessions of a study as one table that is its forest plot: grouped by animal, every row on the same axis. */
export function SessionForest({ groups }: { groups: readonly ForestGroup[] }) {
  const labels = useMemo(
    () =>
      [
        ...new Set(groups.flatMap((group) => group.rows.flatMap((row) => row.readouts.map((r) => r.label)))),
      ].sort(),
    [groups],
  );
  const [label, setLabel] = useState(() => mostUsed(groups) ?? '');
  const [animalId, setAnimalId] = useState('all');
  const [sort, setSort] = useState<{ key: string; descending: boolean }>({ key: 'day', descending: false });
  const shown = groups.filter((group) => animalId === 'all' || group.animal.id === animalId);
  const readouts = shown.flatMap((group) => group.rows.flatMap((row) => readoutOf(row, label) ?? []));
  const axis = sharedAxis(readouts.map((readout) => ({ value: readout.r2, interval: readout.r2Interval })));
  const [scrollRef, widthPx] = useWidth<HTMLDivElement>(1000);
  const glyphPx = widthPx < 560 ? Math.max(240, widthPx - 4) : wideGlyphPx;
  const columns = forestColumns({ axis, glyphPx, hasReadouts: labels.length > 0 });
  const nSessions = shown.reduce((sum, group) => sum + group.rows.length, 0);

  const ordered = (rows: readonly ForestRow[]) => {
    const column = columns.find((candidate) => candidate.key === sort.key) ?? columns[0];
    const value = (row: ForestRow) => column.value?.(row, readoutOf(row, label)) ?? null;
    return [...rows].sort((a, b) => {
      const [x, y] = [value(a), value(b)];
      if (x === null || y === null) return x === y ? 0 : x === null ? 1 : -1;
      const difference =
        typeof x === 'number' && typeof y === 'number' ? x - y : String(x).localeCompare(String(y));
      return sort.descending ? -difference : difference;
    });
  };

  return (
    <>
      {labels.length > 0 ? (
        <p className="filters">
          Showing each session’s newest finished readout of{' '}
          <PickSelect
            label="Label"
            value={label}
            options={labels.map((value) => ({ value, text: value }))}
            onChange={setLabel}
          />{' '}
          in{' '}
          <PickSelect
            label="Animals"
            value={animalId}
            options={[
              { value: 'all', text: 'all animals' },
              ...groups.map((group) => ({ value: group.animal.id, text: group.animal.code })),
            ]}
            onChange={setAnimalId}
          />
          : {numbers(`${formatPlural(readouts.length, 'readout')} of ${formatPlural(nSessions, 'session')}.`)}
        </p>
      ) : null}
      <div
        className="scroll"
        tabIndex={0}
        role="region"
        aria-label="Sessions with held-out R²"
        ref={scrollRef}
      >
        <table className={labels.length > 0 ? 'stack forest' : 'forest'} role="table">
          <caption className="vh">Sessions with held-out R², grouped by animal</caption>
          <thead role="rowgroup">
            <tr role="row">
              {columns.map((column) => (
                <HeadCell key={column.key} column={column} glyphPx={glyphPx} sort={sort} onSort={setSort}>
                  {column.key === 'interval' ? <IntervalAxis axis={axis} width={glyphPx} /> : null}
                </HeadCell>
              ))}
            </tr>
          </thead>
          <tbody role="rowgroup">
            {shown.map((group) => (
              <AnimalRows
                key={group.animal.id}
                group={group}
                rows={ordered(group.rows)}
                columns={columns}
                label={label}
              />
            ))}
          </tbody>
        </table>
      </div>
    </>
  );
}

function mostUsed(groups: readonly ForestGroup[]): string | undefined {
  const uses = new Map<string, number>();
  for (const group of groups)
    for (const row of group.rows)
      for (const readout of row.readouts) uses.set(readout.label, (uses.get(readout.label) ?? 0) + 1);
  return [...uses].sort((a, b) => b[1] - a[1] || a[0].localeCompare(b[0]))[0]?.[0];
}

function HeadCell({
  column,
  glyphPx,
  sort,
  onSort,
  children,
}: {
  column: ForestColumn;
  glyphPx: number;
  sort: { key: string; descending: boolean };
  onSort: (sort: { key: string; descending: boolean }) => void;
  children: React.ReactNode;
}) {
  const isSorted = sort.key === column.key;
  return (
    <th
      scope="col"
      role="columnheader"
      className={column.numeric ? 'num' : undefined}
      aria-sort={isSorted ? (sort.descending ? 'descending' : 'ascending') : undefined}
      style={children ? { width: glyphPx + 14 } : undefined}
    >
      {children ?? (
        <button
          type="button"
          onClick={() => onSort({ key: column.key, descending: isSorted ? !sort.descending : false })}
        >
          {column.head}
          {column.unit ? <span className="u">{column.unit}</span> : null}
        </button>
      )}
    </th>
  );
}

function AnimalRows({
  group,
  rows,
  columns,
  label,
}: {
  group: ForestGroup;
  rows: readonly ForestRow[];
  columns: readonly ForestColumn[];
  label: string;
}) {
  const { animal } = group;
  return (
    <>
      <tr className="group" role="row">
        <th colSpan={columns.length} scope="rowgroup" role="rowheader">
          <AnimalShape index={group.index} />
          <b>{animal.code}</b>{' '}
          <span className="quiet">
            {animal.sex === 'unknown' ? animal.species : `${animal.sex}, ${animal.species}`}
          </span>
        </th>
      </tr>
      {rows.length === 0 ? (
        <tr className="flush" role="row">
          <td colSpan={columns.length} role="cell" className="quiet forest-none">
            no session yet
          </td>
        </tr>
      ) : null}
      {rows.map((row) => {
        const readout = readoutOf(row, label);
        return (
          <tr className={row.state === 'refused' ? 'flush out' : 'flush'} key={row.sessionId} role="row">
            {columns.map((column) => (
              <td key={column.key} role="cell" className={column.cellClass}>
                {column.cell(row, readout, animal.code)}
              </td>
            ))}
          </tr>
        );
      })}
    </>
  );
}
