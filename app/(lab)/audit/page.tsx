import type { Metadata } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { Fragment } from 'react';
import { AuditTable } from '@/components/lab/audit-table';
import { Sheet } from '@/components/shell/sheet';
import { Num } from '@/components/ui/num';
import { Section } from '@/components/ui/section';
import { requirePageContext } from '@/lib/auth/page-context';
import { formatCount } from '@/lib/format/format-count';
import { can } from '@/lib/policy/can';
import { listAudit } from '@/lib/services/audit/list-audit';
import { verifyAudit } from '@/lib/services/audit/verify-audit';

export const metadata: Metadata = { title: 'Audit trail' };

export default async function AuditPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}) {
  const ctx = await requirePageContext();
  if (!can(ctx.actor, 'audit.read')) notFound();
  const { cursor } = await searchParams;
  const page = await listAudit(ctx, { cursor: typeof cursor === 'string' ? cursor : undefined, limit: 100 });
  const chain = await verifyAudit(ctx);
  return (
    <Sheet trail={[{ label: 'Audit trail' }]}>
      <Section>
        <h1 className="name">Audit trail</h1>
        <p className="verdict">
          {chain.holds ? (
            <>
              All {formatCount(chain.entries)} rows <b>hold together</b>: each carries the hash of the one
              before it.
            </>
          ) : (
            <>
              The trail <b>does not hold</b>: {chain.faults[0]?.message}.
            </>
          )}
        </p>
        {chain.headHash ? (
          <p className="lead">
            The newest row’s hash is{' '}
            {chain.headHash.match(/.{1,16}/g)?.map((part, at) => (
              <Fragment key={`${at} ${part}`}>
                <wbr />
                <Num>{part}</Num>
              </Fragment>
            ))}
            . Written down elsewhere, it shows later that nothing before it was changed.
          </p>
        ) : null}
        {chain.holds ? null : (
          <ul>
            {chain.faults.map((fault) => (
              <li key={`${fault.entryId} ${fault.message}`}>{fault.message}</li>
            ))}
          </ul>
        )}
      </Section>
      <Section
        title="Rows"
        id="rows"
        why="Who did what, when. Rows are only ever added, in the same step as the change itself."
      >
        <AuditTable entries={page.items} />
        <div className="acts">
          {cursor === undefined ? null : <Link href="/audit">The newest</Link>}
          {page.nextCursor ? (
            <Link href={`/audit?cursor=${encodeURIComponent(page.nextCursor)}`}>Earlier rows</Link>
          ) : null}
        </div>
      </Section>
    </Sheet>
  );
}
