'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { CreateToken } from '@/components/account/create-token';
import { Button } from '@/components/ui/button';
import { DataTable, type TableColumn } from '@/components/ui/data-table';
import { EmptyState } from '@/components/ui/empty-state';
import { FormError } from '@/components/ui/form-error';
import { Section } from '@/components/ui/section';
import { requestJson } from '@/lib/client/request-json';
import type { Scope, Token } from '@/lib/contracts/lab';
import { formatDate } from '@/lib/format/format-date';
import { formatInstant } from '@/lib/format/format-instant';

/** The member's tokens for scripts: made here, shown once, revoked here. `now` decides which are over. */
export function Tokens({
  tokens,
  scopes,
  now,
}: {
  tokens: readonly Token[];
  scopes: readonly Scope[];
  now: string;
}) {
  const router = useRouter();
  const [refusal, setRefusal] = useState<string | null>(null);
  const revoke = async (token: Token) => {
    setRefusal(null);
    try {
      await requestJson(`/tokens/${token.id}`, { method: 'DELETE' });
    } catch (error) {
      setRefusal(error instanceof Error ? error.message : 'That did not work.');
    }
    router.refresh();
  };
  const columns: TableColumn<Token>[] = [
    { key: 'name', head: 'Token', value: (token) => token.name, cell: (token) => token.name },
    { key: 'scopes', head: 'May', cell: (token) => token.scopes.join(', ') },
    {
      key: 'used',
      head: 'Last used',
      numeric: true,
      value: (token) => token.lastUsedAt,
      cell: (token) => (token.lastUsedAt ? formatInstant(token.lastUsedAt) : 'never'),
    },
    {
      key: 'end',
      head: 'Ends',
      numeric: true,
      value: (token) => token.expiresAt,
      cell: (token) => formatDate(token.expiresAt),
    },
    {
      key: 'act',
      head: 'Revoke',
      cell: (token) =>
        token.revokedAt ? (
          'revoked'
        ) : token.expiresAt <= now ? (
          'over'
        ) : (
          <Button kind="link" onClick={() => void revoke(token)}>
            Revoke
          </Button>
        ),
    },
  ];
  return (
    <Section
      title="Tokens"
      id="tokens"
      why="For scripts on rig computers. A token acts for you, never beyond your role, and dies with your membership."
    >
      {tokens.length === 0 ? (
        <EmptyState title="No token yet">A script sends it in the header Authorization: Bearer.</EmptyState>
      ) : (
        <DataTable
          caption="Your tokens"
          columns={columns}
          rows={tokens}
          rowKey={(token) => token.id}
          rowClass={(token) => (token.revokedAt || token.expiresAt <= now ? 'quiet' : '')}
        />
      )}
      <FormError message={refusal} />
      {/* Always at the same place: the dialog shows a secret once and must outlive the first row. */}
      <div className="acts">
        <CreateToken scopes={scopes} />
      </div>
    </Section>
  );
}
