import type { Metadata } from 'next';
import { readAll } from '@/app/(lab)/read-all';
import { Invitations } from '@/components/lab/invitations';
import { Members } from '@/components/lab/members';
import { Sheet } from '@/components/shell/sheet';
import { Section } from '@/components/ui/section';
import { requirePageContext } from '@/lib/auth/page-context';
import { can } from '@/lib/policy/can';
import { listInvitations } from '@/lib/services/invitations/list-invitations';
import { listMembers } from '@/lib/services/members/list-members';

export const metadata: Metadata = { title: 'Members' };

export default async function MembersPage() {
  const ctx = await requirePageContext();
  const mayInvite = can(ctx.actor, 'member.invite');
  const [members, invitations] = await Promise.all([
    listMembers(ctx),
    mayInvite ? readAll((cursor) => listInvitations(ctx, { cursor, limit: 200 })) : null,
  ]);
  return (
    <Sheet trail={[{ label: 'Members' }]}>
      <Section>
        <h1 className="name">Members of {ctx.actor.labName}</h1>
      </Section>
      <Members members={members.items} mayChange={can(ctx.actor, 'member.change')} />
      {invitations ? <Invitations invitations={invitations.items} /> : null}
    </Sheet>
  );
}
