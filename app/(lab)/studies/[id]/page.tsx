import type { Metadata } from 'next';
import { readStudy, readStudyRows } from '@/app/(lab)/studies/[id]/read-study';
import { Sheet } from '@/components/shell/sheet';
import { AnimalTable } from '@/components/study/animal-table';
import { AttentionList } from '@/components/study/attention-list';
import { attentionOf } from '@/components/study/attention-of';
import { CreateAnimal } from '@/components/study/create-animal';
import { CreateSession } from '@/components/study/create-session';
import { ForestLegend } from '@/components/study/forest-legend';
import { SessionForest } from '@/components/study/session-forest';
import { EmptyState } from '@/components/ui/empty-state';
import { Facts } from '@/components/ui/facts';
import { numbers } from '@/components/ui/numbers';
import { Section } from '@/components/ui/section';
import { requirePageContext } from '@/lib/auth/page-context';
import { formatCount } from '@/lib/format/format-count';
import { formatDate } from '@/lib/format/format-date';
import { formatPlural } from '@/lib/format/format-plural';
import { can } from '@/lib/policy/can';

interface PageProps {
  params: Promise<{ id: string }>;
}

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  return { title: (await readStudy((await params).id)).name };
}

export default async function StudyPage({ params }: PageProps) {
  const { id } = await params;
  const ctx = await requirePageContext();
  const study = await readStudy(id);
  const { groups, rows } = await readStudyRows(id);
  const animals = groups.map((group) => group.animal);
  const species = [...new Set(animals.map((animal) => animal.species))];
  const attention = attentionOf(rows);
  const mayAddAnimal = can(ctx.actor, 'animal.create');
  const mayAddSession = can(ctx.actor, 'session.create');
  const nReady = rows.filter((row) => row.state === 'ready').length;
  const nReadouts = rows.reduce((sum, row) => sum + row.nReadouts, 0);

  return (
    <Sheet trail={[{ label: study.name }]}>
      <Section
        side={
          <>
            <p className="study-facts-side">
              <b>{study.name}</b>
            </p>
            <p>{numbers(`Study of the ${ctx.actor.labName}, since ${formatDate(study.createdAt)}`)}</p>
          </>
        }
      >
        <h1 className="verdict">
          {numbers(study.question === '' ? study.name : emphasised(study.question))}
        </h1>
        <Facts
          items={[
            { term: 'animals', value: [formatCount(animals.length), ...species.slice(0, 2)].join(', ') },
            { term: 'sessions', value: `${formatCount(rows.length)}, ${formatCount(nReady)} ready` },
            { term: 'readouts made', value: formatCount(nReadouts) },
          ]}
        />
        {mayAddSession && animals.length > 0 ? (
          <div className="acts">
            <CreateSession studyId={id} animals={animals} />
          </div>
        ) : null}
      </Section>
      {attention.length > 0 ? (
        <Section title="Wants attention" id="attention">
          <AttentionList items={attention} />
        </Section>
      ) : null}
      <Section
        title="Sessions"
        id="sessions"
        why={
          nReadouts > 0
            ? 'Each row draws its own interval, all of them on one axis.'
            : 'Grouped by animal, by day.'
        }
        side={nReadouts > 0 ? <ForestLegend /> : null}
      >
        {rows.length > 0 ? (
          <>
            <SessionForest groups={groups} />
            {nReadouts > 0 ? (
              <p className="cap">
                {numbers(
                  'Marks: held-out R² over trials that were out of the fold. Bars: 95 % interval by nested cross-validation, broken because none of these readouts follows a plan frozen beforehand. Hatched: middle 95 % of that readout’s shuffles.',
                )}
              </p>
            ) : null}
          </>
        ) : animals.length === 0 ? (
          <EmptyState
            title="No animal and no session yet"
            action={mayAddAnimal ? <CreateAnimal studyId={id} species="" kind="filled" /> : null}
            second={
              mayAddAnimal
                ? 'then bring its first session in'
                : 'An experimenter, an analyst or a lead adds them.'
            }
          >
            A session belongs to an animal, so the animal comes first.
          </EmptyState>
        ) : (
          <EmptyState
            title="No session yet"
            second={mayAddSession ? 'Bring the first session in, above.' : null}
          >
            {`${formatPlural(animals.length, 'animal')} of this study, no recording session.`}
          </EmptyState>
        )}
      </Section>
      {animals.length > 0 ? (
        <Section title="Animals" id="animals" why="Known by a code of the lab.">
          <AnimalTable
            lines={groups.map(({ animal, index, rows: own }) => ({ animal, index, nSessions: own.length }))}
          />
          {mayAddAnimal ? (
            <div className="acts">
              <CreateAnimal studyId={id} species={species[0] ?? ''} />
            </div>
          ) : null}
        </Section>
      ) : null}
    </Sheet>
  );
}

/** A question may carry its key words between double asterisks. */
function emphasised(question: string) {
  return question
    .split(/\*\*(.+?)\*\*/)
    .map((part, index) => (index % 2 === 1 ? <b key={`${index} ${part}`}>{part}</b> : part));
}
