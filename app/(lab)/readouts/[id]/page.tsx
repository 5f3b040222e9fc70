import type { Metadata } from 'next';
import Link from 'next/link';
import { readPlace, readReadout } from '@/app/(lab)/readouts/[id]/read-readout';
import { ReadoutSheet } from '@/app/(lab)/readouts/[id]/readout-sheet';
import { ReadoutEnded } from '@/components/readout/readout-ended';
import { ReadoutRecord } from '@/components/readout/readout-record';
import { ReadoutRunning } from '@/components/readout/readout-running';
import { Sheet } from '@/components/shell/sheet';
import { numbers } from '@/components/ui/numbers';
import { Section } from '@/components/ui/section';
import { requirePageContext } from '@/lib/auth/page-context';
import { can } from '@/lib/policy/can';

interface PageProps {
  params: Promise<{ id: string }>;
}

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  const readout = await readReadout((await params).id);
  const { session } = await readPlace(readout.sessionId);
  return { title: `Readout ${readout.number}, ${session.name}` };
}

export default async function ReadoutPage({ params }: PageProps) {
  const { id } = await params;
  const ctx = await requirePageContext();
  const readout = await readReadout(id);
  const { session, study, newestNumber } = await readPlace(readout.sessionId);
  const mayRepeat = can(ctx.actor, 'readout.create');
  const trail = [
    { label: study.name, href: `/studies/${study.id}` },
    { label: session.name, href: `/sessions/${session.id}` },
    { label: `Readout ${readout.number}` },
  ];
  const side = (
    <>
      <p className="why">
        {numbers(`Readout ${readout.number} of ${newestNumber} on this session`)}
        <br />
        <b style={{ color: 'var(--ink)' }}>Exploratory</b>
      </p>
      {readout.provenance && (
        <p>
          {numbers(
            `Data version ${readout.provenance.dataVersion}, ${readout.provenance.dataVersion === session.dataVersion ? 'current' : `not the current one (${session.dataVersion})`}.`,
          )}
        </p>
      )}
      <ul className="todo">
        {mayRepeat && (
          <li>
            <Link href={`/sessions/${session.id}/readouts/new?from=${readout.id}`}>
              Repeat with one change
            </Link>
          </li>
        )}
        <li>
          <Link href={`/sessions/${session.id}#attempts`}>Attempt ledger</Link>
        </li>
      </ul>
    </>
  );
  if (readout.state === 'done' && readout.result) {
    return (
      <Sheet trail={trail}>
        <ReadoutSheet
          readout={readout}
          result={readout.result}
          session={session}
          newestNumber={newestNumber}
          side={side}
          mayExclude={can(ctx.actor, 'exclusion.create')}
        />
      </Sheet>
    );
  }
  const labelKind = session.labels.find((label) => label.column === readout.recipe.label)?.kind;
  const runs = readout.state === 'queued' || readout.state === 'running';
  return (
    <Sheet trail={trail}>
      <Section side={side}>
        <h1 className="name">{numbers(`Readout ${readout.number} of ${session.name}`)}</h1>
        <div style={{ marginTop: 20 }}>
          {runs ? (
            <ReadoutRunning
              readoutId={readout.id}
              sessionId={session.id}
              number={readout.number}
              createdAt={readout.createdAt}
              initialState={readout.state}
              initialProgress={readout.progress}
              mayCancel={can(ctx.actor, 'readout.cancel')}
            />
          ) : (
            <ReadoutEnded readout={readout} mayRepeat={mayRepeat} />
          )}
        </div>
      </Section>
      <Section title="Record" id="record" why="What was asked for.">
        <ReadoutRecord readout={readout} labelKind={labelKind} fileName={`readout-${readout.number}`} />
      </Section>
    </Sheet>
  );
}
