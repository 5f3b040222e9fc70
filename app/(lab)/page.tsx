import type { Metadata } from 'next';
import Link from 'next/link';
import { readAll } from '@/app/(lab)/read-all';
import { Sheet } from '@/components/shell/sheet';
import { CreateStudy } from '@/components/study/create-study';
import { StudyTable } from '@/components/study/study-table';
import { EmptyState } from '@/components/ui/empty-state';
import { Facts } from '@/components/ui/facts';
import { Section } from '@/components/ui/section';
import { requirePageContext } from '@/lib/auth/page-context';
import { formatCount } from '@/lib/format/format-count';
import { can } from '@/lib/policy/can';
import { listAnimals } from '@/lib/services/animals/list-animals';
import { listSessions } from '@/lib/services/sessions/list-sessions';
import { listStudies } from '@/lib/services/studies/list-studies';

export const metadata: Metadata = { title: 'Lab' };

export default async function LabPage() {
  const ctx = await requirePageContext();
  const studies = await readAll((cursor) => listStudies(ctx, { cursor, limit: 200 }));
  const lines = await Promise.all(
    studies.items.map(async (study) => {
      const [animals, sessions] = await Promise.all([
        readAll((cursor) => listAnimals(ctx, { studyId: study.id, cursor, limit: 200 })),
        readAll((cursor) => listSessions(ctx, { studyId: study.id, cursor, limit: 200 })),
      ]);
      return {
        study,
        nAnimals: animals.items.length,
        nSessions: sessions.items.length,
        nReady: sessions.items.filter((session) => session.state === 'ready').length,
      };
    }),
  );
  const total = (pick: (line: (typeof lines)[number]) => number) =>
    formatCount(lines.reduce((sum, line) => sum + pick(line), 0));
  const mayCreate = can(ctx.actor, 'study.create');
  return (
    <Sheet trail={[]}>
      <Section
        side={
          <>
            <p className="study-facts-side">
              <b>{ctx.actor.labName}</b>
            </p>
            <p>You are here as {ctx.actor.role}.</p>
            <p>
              <Link href="/members">Members</Link>
            </p>
            {can(ctx.actor, 'audit.read') ? (
              <p>
                <Link href="/audit">Audit trail</Link>
              </p>
            ) : null}
          </>
        }
      >
        <h1 className="name">Studies</h1>
        <p className="lead">
          Each study asks one question of its animals and sessions, and keeps every readout that was tried on
          them.
        </p>
        {lines.length > 0 ? (
          <Facts
            items={[
              { term: 'studies', value: formatCount(lines.length) },
              { term: 'animals', value: total((line) => line.nAnimals) },
              { term: 'sessions', value: total((line) => line.nSessions) },
              { term: 'ready', value: total((line) => line.nReady) },
            ]}
          />
        ) : null}
      </Section>
      <Section title="All studies" id="studies" why="One line a study; its page holds the sessions.">
        {lines.length === 0 ? (
          <EmptyState
            title="No study yet"
            action={mayCreate ? <CreateStudy /> : null}
            second={mayCreate ? null : 'A lead or an analyst of the lab opens the first one.'}
          >
            A study is one scientific question: its animals, sessions and readouts stand under it.
          </EmptyState>
        ) : (
          <>
            <StudyTable lines={lines} />
            {studies.isWhole ? null : (
              <p className="cap">The first {formatCount(studies.items.length)} are shown.</p>
            )}
            {mayCreate ? (
              <div className="acts">
                <CreateStudy />
              </div>
            ) : null}
          </>
        )}
      </Section>
    </Sheet>
  );
}
