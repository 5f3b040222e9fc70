'use client';

import { DataTable, type TableColumn } from '@/components/ui/data-table';
import { Num } from '@/components/ui/num';
import type { AuditEntry } from '@/lib/contracts/audit';
import { formatInstant } from '@/lib/format/format-instant';

const columns: TableColumn<AuditEntry>[] = [
  {
    key: 'row',
    head: 'Row',
    widthPx: 64,
    numeric: true,
    value: (entry) => entry.id,
    cell: (entry) => entry.id,
  },
  {
    key: 'when',
    head: 'When',
    numeric: true,
    value: (entry) => entry.createdAt,
    cell: (entry) => formatInstant(entry.createdAt),
  },
  {
    key: 'who',
    head: 'Who',
    value: (entry) => entry.actorName,
    cell: (entry) =>
      entry.actorName ?? (entry.requestId?.startsWith('job-') ? 'the worker' : 'nobody signed in'),
  },
  {
    key: 'what',
    head: 'What',
    value: (entry) => entry.action,
    cell: (entry) => <Num>{entry.action}</Num>,
  },
  {
    key: 'on',
    head: 'On',
    value: (entry) => entry.subjectKind,
    cell: (entry) => <Num>{`${entry.subjectKind} …${entry.subjectId.slice(-8)}`}</Num>,
  },
  {
    key: 'detail',
    head: 'Detail',
    className: 'wraps',
    cell: (entry) => shorten(JSON.stringify(entry.detail)),
  },
  { key: 'hash', head: 'Hash', cell: (entry) => <Num>{entry.hash.slice(0, 8)}</Num> },
];

const longest = 220;
function shorten(text: string): string {
  if (text === '{}') return '';
  return text.length > longest ? `${text.slice(0, longest)} …` : text;
}

/** Rows of the audit trail, the newest first. */
export function AuditTable({ entries }: { entries: readonly AuditEntry[] }) {
  return (
    <DataTable
      caption="The lab’s audit trail"
      columns={columns}
      rows={entries}
      rowKey={(entry) => String(entry.id)}
      minWidthPx={980}
      sortBy={{ key: 'row', descending: true }}
    />
  );
}
