import type { Metadata } from 'next';
import Link from 'next/link';
import { readSession, readSurroundings } from '@/app/(lab)/sessions/[id]/read-session';
import { SessionSheet } from '@/app/(lab)/sessions/[id]/session-sheet';
import { AttemptLedger } from '@/components/session/attempt-ledger';
import { SessionWaiting } from '@/components/session/session-waiting';
import { Sheet } from '@/components/shell/sheet';
import { EmptyState } from '@/components/ui/empty-state';
import { ButtonLink } from '@/components/ui/button-link';
import { KeyValues } from '@/components/ui/key-values';
import { numbers } from '@/components/ui/numbers';
import { ProblemList } from '@/components/ui/problem-list';
import { Section } from '@/components/ui/section';
import { requirePageContext } from '@/lib/auth/page-context';
import { formatDate } from '@/lib/format/format-date';
import { formatPlural } from '@/lib/format/format-plural';
import { can } from '@/lib/policy/can';

interface PageProps {
  params: Promise<{ id: string }>;
}

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  return { title: (await readSession((await params).id)).name };
}

export default async function SessionPage({ params }: PageProps) {
  const { id } = await params;
  const ctx = await requirePageContext();
  const session = await readSession(id);
  const { study, exclusions, readouts } = await readSurroundings(session);
  const isReady = session.state === 'ready' && session.dataVersion !== null;
  const mayReadOut = can(ctx.actor, 'readout.create');
  const mayExclude = can(ctx.actor, 'exclusion.create');
  const newReadout = `/sessions/${session.id}/readouts/new`;
  const fileName = session.name.replace(/[^\p{L}\p{N}]+/gu, '-');
  const side = (
    <>
      <KeyValues
        items={[
          { term: 'animal', value: session.animalCode },
          { term: 'date', value: formatDate(session.startedAt) },
        ]}
      />
      <p>
        <Link href={`/sessions/${session.id}/intake`}>Intake</Link>
      </p>
    </>
  );
  const acts = (
    <div className="acts" style={{ marginTop: 20 }}>
      {isReady && mayReadOut && <ButtonLink href={newReadout}>New readout</ButtonLink>}
      {isReady && !mayReadOut && (
        <span className="say">{`As ${ctx.actor.role} you see everything; readouts are made by analysts and leads.`}</span>
      )}
    </div>
  );
  return (
    <Sheet trail={[{ label: study.name, href: `/studies/${study.id}` }, { label: session.name }]}>
      {isReady ? (
        <SessionSheet
          session={session}
          exclusions={exclusions}
          side={side}
          acts={acts}
          mayExclude={mayExclude}
          fileName={fileName}
        />
      ) : (
        <>
          <Section side={side}>
            <h1 className="name">{numbers(session.name)}</h1>
            <div style={{ marginTop: 16 }}>
              <SessionWaiting
                sessionId={session.id}
                state={session.state}
                mayUpload={can(ctx.actor, 'file.upload')}
              />
            </div>
          </Section>
          {session.problems.length > 0 && (
            <Section title="Problems" id="problems" why="What the checks found, and where.">
              <ProblemList problems={session.problems} />
            </Section>
          )}
        </>
      )}
      {(isReady || readouts.items.length > 0) && (
        <Section
          title="Attempt ledger"
          id="attempts"
          why={`Every readout ever tried on this session: ${readouts.items[0]?.number ?? 0}.`}
        >
          {readouts.items.length === 0 ? (
            <EmptyState
              title="No readout yet"
              action={mayReadOut ? <ButtonLink href={newReadout}>New readout</ButtonLink> : null}
            >
              {`The label is checked and ${formatPlural((session.units ?? 0) - exclusions.excludedUnits.length, 'unit')} can be used.`}
            </EmptyState>
          ) : (
            <AttemptLedger
              sessionId={session.id}
              lines={readouts.items}
              manyLabels={new Set(readouts.items.map((line) => line.label)).size > 1}
              fileName={fileName}
            />
          )}
          {!readouts.isWhole && (
            <p className="cap">{numbers(`The newest ${readouts.items.length} are shown.`)}</p>
          )}
        </Section>
      )}
    </Sheet>
  );
}
