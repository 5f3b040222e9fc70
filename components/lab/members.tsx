'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { RemoveMember } from '@/components/lab/remove-member';
import { roleLines, roleOptions } from '@/components/lab/role-words';
import { DataTable, type TableColumn } from '@/components/ui/data-table';
import { FormError } from '@/components/ui/form-error';
import { PickSelect } from '@/components/ui/pick-select';
import { Section } from '@/components/ui/section';
import { requestJson } from '@/lib/client/request-json';
import type { Member } from '@/lib/contracts/account';
import type { Role } from '@/lib/contracts/lab';
import { formatDate } from '@/lib/format/format-date';

/** The lab's members; a lead changes roles and ends memberships in the row. */
export function Members({ members, mayChange }: { members: readonly Member[]; mayChange: boolean }) {
  const router = useRouter();
  const [refusal, setRefusal] = useState<string | null>(null);
  const change = async (member: Member, role: Role) => {
    setRefusal(null);
    try {
      await requestJson(`/members/${member.userId}`, { method: 'PATCH', body: { role } });
    } catch (error) {
      setRefusal(error instanceof Error ? error.message : 'That did not work.');
    }
    router.refresh();
  };
  const columns: TableColumn<Member>[] = [
    { key: 'name', head: 'Member', value: (member) => member.name, cell: (member) => member.name },
    { key: 'email', head: 'Mail address', value: (member) => member.email, cell: (member) => member.email },
    {
      key: 'role',
      head: 'Role',
      value: (member) => member.role,
      cell: (member) =>
        mayChange ? (
          <PickSelect
            small
            label={`Role of ${member.name}`}
            value={member.role}
            options={roleOptions}
            onChange={(role) => void change(member, role)}
          />
        ) : (
          member.role
        ),
    },
    {
      key: 'since',
      head: 'Since',
      numeric: true,
      value: (member) => member.joinedAt,
      cell: (member) => formatDate(member.joinedAt),
    },
    ...(mayChange
      ? [
          {
            key: 'end',
            head: 'Remove',
            cell: (member: Member) => <RemoveMember member={member} onRefused={setRefusal} />,
          },
        ]
      : []),
  ];
  return (
    <Section
      title="Members"
      id="members"
      side={
        <dl className="side-roles">
          {roleLines.map(({ role, line }) => (
            <div key={role}>
              <dt>
                <b>{role}</b>
              </dt>
              <dd>{line}</dd>
            </div>
          ))}
        </dl>
      }
    >
      <DataTable
        caption="Members of the lab"
        columns={columns}
        rows={members}
        rowKey={(member) => member.userId}
        sortBy={{ key: 'since', descending: false }}
      />
      <FormError message={refusal} />
    </Section>
  );
}
