'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { InviteMember } from '@/components/lab/invite-member';
import { Button } from '@/components/ui/button';
import { DataTable, type TableColumn } from '@/components/ui/data-table';
import { EmptyState } from '@/components/ui/empty-state';
import { FormError } from '@/components/ui/form-error';
import { Section } from '@/components/ui/section';
import { requestJson } from '@/lib/client/request-json';
import type { Invitation } from '@/lib/contracts/account';
import { formatDate } from '@/lib/format/format-date';

/** The lab's invitations: sent, accepted, taken back, over. */
export function Invitations({ invitations }: { invitations: readonly Invitation[] }) {
  const router = useRouter();
  const [refusal, setRefusal] = useState<string | null>(null);
  const revoke = async (invitation: Invitation) => {
    setRefusal(null);
    try {
      await requestJson(`/invitations/${invitation.id}`, { method: 'DELETE' });
    } catch (error) {
      setRefusal(error instanceof Error ? error.message : 'That did not work.');
    }
    router.refresh();
  };
  const columns: TableColumn<Invitation>[] = [
    { key: 'email', head: 'Mail address', value: (item) => item.email, cell: (item) => item.email },
    { key: 'role', head: 'As', value: (item) => item.role, cell: (item) => item.role },
    { key: 'by', head: 'By', value: (item) => item.inviterName, cell: (item) => item.inviterName },
    {
      key: 'sent',
      head: 'Sent',
      numeric: true,
      value: (item) => item.createdAt,
      cell: (item) => formatDate(item.createdAt),
    },
    {
      key: 'state',
      head: 'State',
      value: (item) => item.state,
      cell: (item) => (item.state === 'open' ? <>open until {formatDate(item.expiresAt)}</> : item.state),
    },
    {
      key: 'act',
      head: 'Take back',
      cell: (item) =>
        item.state === 'open' ? (
          <Button kind="link" onClick={() => void revoke(item)}>
            Take back
          </Button>
        ) : null,
    },
  ];
  return (
    <Section
      title="Invitations"
      id="invitations"
      why="A mail brings a link that works once, for 7 days. A new invitation of an address replaces its open one."
    >
      {invitations.length === 0 ? (
        <EmptyState title="No invitation yet" action={<InviteMember />} />
      ) : (
        <>
          <DataTable
            caption="Invitations to the lab"
            columns={columns}
            rows={invitations}
            rowKey={(item) => item.id}
            rowClass={(item) => (item.state === 'open' ? '' : 'quiet')}
            sortBy={{ key: 'sent', descending: true }}
          />
          <FormError message={refusal} />
          <div className="acts">
            <InviteMember />
          </div>
        </>
      )}
    </Section>
  );
}
