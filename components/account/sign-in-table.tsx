'use client';

import { Button } from '@/components/ui/button';
import { DataTable, type TableColumn } from '@/components/ui/data-table';
import type { SignIn } from '@/lib/contracts/account';
import { formatAgent } from '@/lib/format/format-agent';
import { formatInstant } from '@/lib/format/format-instant';

/** The member's open browser sessions, each with its end beside it. */
export function SignInTable({
  signIns,
  onEnd,
}: {
  signIns: readonly SignIn[];
  onEnd: (signIn: SignIn) => void;
}) {
  const columns: TableColumn<SignIn>[] = [
    {
      key: 'agent',
      head: 'Browser',
      value: (item) => formatAgent(item.agent),
      cell: (item) => formatAgent(item.agent),
    },
    { key: 'address', head: 'Address', className: 'n', cell: (item) => item.address },
    {
      key: 'since',
      head: 'Signed in',
      numeric: true,
      value: (item) => item.createdAt,
      cell: (item) => formatInstant(item.createdAt),
    },
    {
      key: 'seen',
      head: 'Last used',
      numeric: true,
      value: (item) => item.lastSeenAt,
      cell: (item) => formatInstant(item.lastSeenAt),
    },
    {
      key: 'end',
      head: 'End',
      widthPx: 90,
      cell: (item) =>
        item.isThisOne ? (
          'this one'
        ) : (
          <Button kind="link" onClick={() => onEnd(item)}>
            End
          </Button>
        ),
    },
  ];
  return (
    <DataTable
      caption="Open browser sessions"
      columns={columns}
      rows={signIns}
      rowKey={(item) => item.id}
      sortBy={{ key: 'seen', descending: true }}
    />
  );
}
