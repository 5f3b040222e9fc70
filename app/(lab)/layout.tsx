import type { ReactNode } from 'react';
import { Patterns } from '@/components/shell/patterns';
import { QueryProvider } from '@/components/shell/query-provider';
import { ViewerProvider } from '@/components/shell/viewer';
import { requirePageContext } from '@/lib/auth/page-context';

export default async function LabLayout({ children }: { children: ReactNode }) {
  const { actor } = await requirePageContext();
  return (
    <ViewerProvider viewer={{ userName: actor.userName, role: actor.role, labName: actor.labName }}>
      <QueryProvider>
        <Patterns />
        {children}
      </QueryProvider>
    </ViewerProvider>
  );
}
