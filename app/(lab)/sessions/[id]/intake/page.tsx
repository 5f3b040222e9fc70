import type { Metadata } from 'next';
import { readAll } from '@/app/(lab)/read-all';
import { readSession } from '@/app/(lab)/sessions/[id]/read-session';
import { IntakeDesk } from '@/components/intake/intake-desk';
import { Sheet } from '@/components/shell/sheet';
import { requirePageContext } from '@/lib/auth/page-context';
import { can } from '@/lib/policy/can';
import { listFiles } from '@/lib/services/files/list-files';
import { getStudy } from '@/lib/services/studies/get-study';

interface PageProps {
  params: Promise<{ id: string }>;
}

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  return { title: `Bring the files in, ${(await readSession((await params).id)).name}` };
}

export default async function IntakePage({ params }: PageProps) {
  const { id } = await params;
  const ctx = await requirePageContext();
  const session = await readSession(id);
  const [study, files] = await Promise.all([
    getStudy(ctx, { studyId: session.studyId }),
    readAll((cursor) => listFiles(ctx, { sessionId: id, cursor, limit: 200 })),
  ]);
  return (
    <Sheet
      trail={[
        { label: study.name, href: `/studies/${study.id}` },
        { label: session.name, href: `/sessions/${id}` },
        { label: 'Intake' },
      ]}
    >
      <IntakeDesk
        session={session}
        files={files.items.reverse()}
        mayUpload={can(ctx.actor, 'file.upload')}
        maySubmit={can(ctx.actor, 'intake.submit')}
      />
    </Sheet>
  );
}
