'use client';

import Link from 'next/link';
import { DataTable, type TableColumn } from '@/components/ui/data-table';
import type { Study } from '@/lib/contracts/lab';
import { formatDate } from '@/lib/format/format-date';

/** A study with what its line in the lab's list counts. */
export interface StudyLine {
  study: Study;
  nAnimals: number;
  nSessions: number;
  nReady: number;
}

const columns: TableColumn<StudyLine>[] = [
  {
    key: 'name',
    head: 'Study',
    value: (line) => line.study.name,
    cell: (line) => <Link href={`/studies/${line.study.id}`}>{line.study.name}</Link>,
    className: 'c-study',
  },
  {
    key: 'question',
    head: 'Question',
    className: 'say wraps c-question',
    headClassName: 'c-question',
    cell: (line) => line.study.question.replaceAll('**', ''),
  },
  {
    key: 'animals',
    head: 'Animals',
    numeric: true,
    value: (line) => line.nAnimals,
    cell: (line) => line.nAnimals,
  },
  {
    key: 'sessions',
    head: 'Sessions',
    unit: 'ready/all',
    numeric: true,
    value: (line) => line.nSessions,
    cell: (line) => (
      <>
        {line.nReady}
        <span className="u">/{line.nSessions}</span>
      </>
    ),
  },
  {
    key: 'since',
    head: 'Since',
    numeric: true,
    value: (line) => line.study.createdAt,
    cell: (line) => formatDate(line.study.createdAt),
  },
];

/** The lab's studies, the newest first. */
export function StudyTable({ lines }: { lines: readonly StudyLine[] }) {
  return (
    <DataTable
      caption="Studies of the lab"
      columns={columns}
      rows={lines}
      rowKey={(line) => line.study.id}
      sortBy={{ key: 'since', descending: true }}
      className="studies"
    />
  );
}
