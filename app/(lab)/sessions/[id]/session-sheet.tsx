import type { ReactNode } from 'react';
import { readTables } from '@/app/(lab)/sessions/[id]/read-session';
import { TrialCursorProvider } from '@/components/charts/trial-cursor';
import { labelWords } from '@/components/recipe/label-words';
import { excludedWithReasons } from '@/components/session/excluded-with-reasons';
import { ExclusionEntries } from '@/components/session/exclusion-entries';
import { LabelFigures } from '@/components/session/label-figures';
import { sessionFacts } from '@/components/session/session-facts';
import { SessionStrip } from '@/components/session/session-strip';
import { UnitSection } from '@/components/session/unit-section';
import { Facts } from '@/components/ui/facts';
import { numbers } from '@/components/ui/numbers';
import { ProblemList } from '@/components/ui/problem-list';
import { Section } from '@/components/ui/section';
import type { ExclusionList, Session } from '@/lib/contracts/session';

/** The working part of a session that is ready: identity, strip, label, units, exclusions. */
export async function SessionSheet({
  session,
  exclusions,
  side,
  acts,
  mayExclude,
  fileName,
}: {
  session: Session;
  exclusions: ExclusionList;
  side: ReactNode;
  acts: ReactNode;
  mayExclude: boolean;
  fileName: string;
}) {
  const tables = await readTables(session, exclusions);
  const { trialColumns, unitColumns, block } = tables;
  const nTrials = session.trials ?? 0;
  const excluded = excludedWithReasons(exclusions, 'trial').map(({ index, reason }) => ({
    trial: index,
    reason,
  }));
  const areaPlace = unitColumns.findIndex((column) => /^(area|region)$/i.test(column.name));
  const labels = session.labels.map((label) => label.column);
  const [label] = labels;
  const labelValues = trialColumns
    .find((column) => column.name === label)
    ?.values.map((value) => (typeof value === 'number' ? value : null));
  // A column of names is drawn as block borders, not as a line.
  const stripColumns = trialColumns.filter((column) => column.type !== 'category');
  return (
    <TrialCursorProvider>
      <Section side={side}>
        <h1 className="name">{numbers(session.name)}</h1>
        <Facts items={sessionFacts(session, exclusions, tables.units, areaPlace)} />
        {acts}
      </Section>
      <Section
        title="Fold strip"
        id="strip"
        why="The session’s trials in time order."
        side={
          <p className="keys">
            <kbd>Left</kbd> <kbd>Right</kbd> trial, with <kbd>Shift</kbd> choose
            {mayExclude && (
              <>
                , <kbd>x</kbd> leave out
              </>
            )}
          </p>
        }
      >
        <SessionStrip
          sessionId={session.id}
          name={session.name}
          nTrials={nTrials}
          labels={labels}
          columns={stripColumns}
          block={block && { name: block.name, values: block.values }}
          excluded={excluded}
          mayExclude={mayExclude}
        />
      </Section>
      {label && labelValues && (
        <Section title="Label" id="label" why="Is there something to read out, and does it drift?">
          <LabelFigures
            label={labelWords(label)}
            values={labelValues}
            rateHz={tables.rateHz}
            excluded={exclusions.excludedTrials}
            fileName={fileName}
          />
        </Section>
      )}
      <Section title="Units" id="units" why="Sort, filter, leave out by rule or by hand.">
        <UnitSection
          sessionId={session.id}
          rows={tables.units}
          columns={unitColumns.map((column) => ({
            name: column.name,
            isNumeric: column.type !== 'category',
          }))}
          mayExclude={mayExclude}
          fileName={fileName}
        />
      </Section>
      <Section
        title="Left out"
        id="exclusions"
        why="Trials and units, with reason, author and time; never deleted."
      >
        <ExclusionEntries
          sessionId={session.id}
          list={exclusions}
          nTrials={nTrials}
          nUnits={session.units ?? 0}
          mayExclude={mayExclude}
        />
      </Section>
      {session.problems.length > 0 && (
        <Section
          title="Checks"
          id="problems"
          why="What the intake found: remarks, and warnings that somebody accepted."
        >
          <ProblemList problems={session.problems} />
        </Section>
      )}
    </TrialCursorProvider>
  );
}
