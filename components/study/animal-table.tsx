'use client';

import { AnimalShape } from '@/components/study/animal-shape';
import { DataTable, type TableColumn } from '@/components/ui/data-table';
import type { Animal } from '@/lib/contracts/lab';
import { formatDate } from '@/lib/format/format-date';

/** An animal with its place among the study's animals (its category mark) and its number of sessions. */
export interface AnimalLine {
  animal: Animal;
  index: number;
  nSessions: number;
}

const columns: TableColumn<AnimalLine>[] = [
  {
    key: 'code',
    head: 'Animal',
    className: 'nowrap',
    value: (line) => line.animal.code,
    cell: (line) => (
      <>
        <AnimalShape index={line.index} />
        <b>{line.animal.code}</b>
      </>
    ),
  },
  {
    key: 'species',
    head: 'Species',
    value: (line) => line.animal.species,
    cell: (line) => line.animal.species,
  },
  { key: 'sex', head: 'Sex', value: (line) => line.animal.sex, cell: (line) => line.animal.sex },
  {
    key: 'born',
    head: 'Born',
    numeric: true,
    value: (line) => line.animal.bornOn,
    cell: (line) => (line.animal.bornOn ? formatDate(line.animal.bornOn) : ''),
  },
  {
    key: 'sessions',
    head: 'Sessions',
    numeric: true,
    value: (line) => line.nSessions,
    cell: (line) => line.nSessions,
  },
];

/** The study's animals. */
export function AnimalTable({ lines }: { lines: readonly AnimalLine[] }) {
  return (
    <DataTable
      caption="Animals of the study"
      columns={columns}
      rows={lines}
      rowKey={(line) => line.animal.id}
      sortBy={{ key: 'code', descending: false }}
      className="narrow-table"
    />
  );
}
