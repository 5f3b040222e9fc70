import type { ReactNode } from 'react';
import { HatchDefs } from '@/components/charts/hatch-defs';
import { QueryProvider } from '@/components/shell/query-provider';
import { ViewerProvider } from '@/components/shell/viewer';
import { requirePageContext } from '@/lib/auth/page-context';

export default async function LabLayout({ children }: { children: ReactNode }) {
  const { actor } = await requirePageContext();
  return (
    <ViewerProvider viewer={{ userName: actor.userName, role: actor.role, labName: actor.labName }}>
      <QueryProvider>
        <HatchDefs />
        {children}
      </QueryProvider>
    </ViewerProvider>
  );
}
