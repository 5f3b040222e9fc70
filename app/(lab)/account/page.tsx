import type { Metadata } from 'next';
import { readAll } from '@/app/(lab)/read-all';
import { SignIns } from '@/components/account/sign-ins';
import { Tokens } from '@/components/account/tokens';
import { Sheet } from '@/components/shell/sheet';
import { Section } from '@/components/ui/section';
import { requirePageContext } from '@/lib/auth/page-context';
import { roleScopes } from '@/lib/policy/role-scopes';
import { listSignIns } from '@/lib/services/accounts/list-sign-ins';
import { listTokens } from '@/lib/services/tokens/list-tokens';

export const metadata: Metadata = { title: 'Your account' };

export default async function AccountPage() {
  const ctx = await requirePageContext();
  const [tokens, signIns] = await Promise.all([
    readAll((cursor) => listTokens(ctx, { cursor, limit: 200 })),
    listSignIns(ctx),
  ]);
  return (
    <Sheet trail={[{ label: 'Your account' }]}>
      <Section>
        <h1 className="name">{ctx.actor.userName}</h1>
        <p className="lead">
          {ctx.actor.email}, {ctx.actor.role} in {ctx.actor.labName}.
        </p>
      </Section>
      <Tokens tokens={tokens.items} scopes={roleScopes[ctx.actor.role]} now={new Date().toISOString()} />
      <SignIns signIns={signIns.items} />
    </Sheet>
  );
}
