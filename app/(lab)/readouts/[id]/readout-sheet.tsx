import type { ReactNode } from 'react';
import { readDrawings } from '@/app/(lab)/readouts/[id]/read-readout';
import { TrialCursorProvider } from '@/components/charts/trial-cursor';
import { FoldStrip } from '@/components/fold-strip/fold-strip';
import type { StripData } from '@/components/fold-strip/strip-data';
import { controlNumbers } from '@/components/readout/control-numbers';
import { ControlsTable } from '@/components/readout/controls-table';
import { FactsLine } from '@/components/readout/facts-line';
import { FoldsTable } from '@/components/readout/folds-table';
import { HeldOutFigure } from '@/components/readout/held-out-figure';
import { LeakReport } from '@/components/readout/leak-report';
import { LevelsFigure } from '@/components/readout/levels-figure';
import { LevelsTable } from '@/components/readout/levels-table';
import { NullFigure } from '@/components/readout/null-figure';
import { readoutFacts } from '@/components/readout/readout-facts';
import { readoutPicture } from '@/components/readout/readout-picture';
import { ReadoutRecord } from '@/components/readout/readout-record';
import { TwoIntervals } from '@/components/readout/two-intervals';
import { VerdictLine } from '@/components/readout/verdict-line';
import { viewNumbersSchema } from '@/components/readout/view-numbers';
import { ViewSections } from '@/components/readout/view-sections';
import { labelWords } from '@/components/recipe/label-words';
import { nullWords } from '@/components/recipe/null-words';
import { penaltyWords } from '@/components/recipe/penalty-words';
import { excludedWithReasons } from '@/components/session/excluded-with-reasons';
import { findBlockColumn } from '@/components/session/find-block-column';
import { ProblemList } from '@/components/ui/problem-list';
import { Section } from '@/components/ui/section';
import type { Readout, ReadoutResult } from '@/lib/contracts/readout';
import type { Session } from '@/lib/contracts/session';
import { formatPlural } from '@/lib/format/format-plural';

/** A finished readout: verdict first, then the picture that supports it, then what it rests on. */
export async function ReadoutSheet({
  readout,
  result,
  session,
  newestNumber,
  side,
  mayExclude,
}: {
  readout: Readout;
  result: ReadoutResult;
  session: Session;
  /** Of the session's attempts. */
  newestNumber: number;
  side: ReactNode;
  mayExclude: boolean;
}) {
  const { recipe, provenance } = readout;
  const { predictions, trialColumns, exclusions } = await readDrawings(
    readout.id,
    session.id,
    provenance?.dataVersion ?? session.dataVersion ?? 1,
    recipe.exclusions === 'none' ? null : recipe.exclusions.version,
  );
  const nTrials = result.counts.trialsAll;
  const purgeTrials = recipe.folds.purgeTrials ?? 0;
  const picture = readoutPicture(predictions, nTrials, purgeTrials);
  const block = findBlockColumn(trialColumns, recipe.null.column ?? recipe.folds.groupColumn);
  const labelColumn = trialColumns.find((column) => column.name === recipe.label);
  const untouched = recipe.labelTransform.kind === 'none';
  const strip: StripData = {
    nTrials,
    label: {
      name: recipe.label,
      // Trials outside the readout show the label of the table; a transformed label has no such values to show.
      values: picture.label.map((value, trial) => {
        const stored = untouched ? labelColumn?.values[trial] : null;
        return value ?? (typeof stored === 'number' ? stored : null);
      }),
    },
    folds: picture.folds,
    predicted: picture.predicted,
    excluded: exclusions
      ? excludedWithReasons(exclusions, 'trial').map(({ index, reason }) => ({ trial: index, reason }))
      : [],
    block: block && { name: block.name, values: block.values },
    column: null,
  };
  const levels = result.perLevel.flatMap((row) =>
    row.meanPredicted === null ? [] : [{ level: row.level, mean: row.meanPredicted, sd: row.sdPredicted }],
  );
  const fileName = `${session.name.replace(/[^\p{L}\p{N}]+/gu, '-')}-readout-${readout.number}`;
  const repeats = new Set(result.perFold.map((fold) => fold.repeat)).size;
  const caption =
    `Each dot is one of ${formatPlural(picture.trials.length, 'trial')}, predicted by a readout fitted without its fold` +
    `${purgeTrials > 0 ? ` and without the ${formatPlural(purgeTrials, 'trial')} on either side of it` : ''}. ` +
    `${levels.length > 1 ? 'Thick lines: mean per level; brackets: ±1 SD over its trials. ' : ''}` +
    `Dotted: identity.${repeats > 1 ? ` Drawn for the first of ${repeats} repeats.` : ''}`;
  const labelKind = session.labels.find((label) => label.column === recipe.label)?.kind;
  const nFolds = picture.folds.nFolds;
  const views = result.views.flatMap((view) => {
    const parsed = viewNumbersSchema.safeParse(view);
    return parsed.success ? [parsed.data] : [];
  });
  const meanLabel =
    picture.trials.reduce((sum, row) => sum + row.label, 0) / Math.max(1, picture.trials.length);

  return (
    <TrialCursorProvider initialTrial={picture.trials[0]?.trial ?? null}>
      <Section side={side}>
        <h1 className="vh">{`Readout ${readout.number} of ${session.name}`}</h1>
        <VerdictLine verdict={result.verdict} place={{ number: readout.number, of: newestNumber }} />
        <FactsLine items={readoutFacts(result)} />
      </Section>
      <Section
        title="Fold strip"
        id="strip"
        why={`Trials in time order: the fold that held each out, its label and its residual.${purgeTrials > 0 ? ` Hatched: the purge gap of ${formatPlural(purgeTrials, 'trial')}.` : ''}`}
        side={
          <p className="keys">
            <kbd>Left</kbd> <kbd>Right</kbd> trial, with <kbd>Shift</kbd> choose, <kbd>f</kbd> next fold
            {mayExclude && (
              <>
                , <kbd>x</kbd> leave out
              </>
            )}
          </p>
        }
      >
        <FoldStrip
          data={strip}
          name={`Readout ${readout.number}, ${session.animalCode}`}
          sessionId={session.id}
          mayExclude={mayExclude}
        />
      </Section>
      <Section
        title="Held-out against true"
        id="held-out"
        why="How close does a prediction come, and how far from chance?"
      >
        <div className="figs" style={{ gridTemplateColumns: '520px minmax(0, 1fr)' }}>
          <HeldOutFigure
            trials={picture.trials}
            levels={levels}
            label={labelWords(recipe.label)}
            caption={caption}
            guess={meanLabel}
            fileName={fileName}
          />
          <div>
            {result.null ? (
              <NullFigure
                result={result}
                scheme={nullWords(recipe.null)}
                chosen={penaltyWords(recipe.estimator).startsWith('chosen')}
                fileName={fileName}
              />
            ) : (
              <p className="lead">
                No shuffled control was run, so this page cannot say how far the readout lies from chance.
              </p>
            )}
            <div style={{ marginTop: 24 }}>
              <FoldsTable result={result} />
            </div>
          </div>
        </div>
      </Section>
      <Section
        title="How sure"
        id="intervals"
        why="What the same recipe would have given with other trials of this session."
      >
        <TwoIntervals result={result} />
      </Section>
      {result.controls.length > 0 && (
        <Section
          title="Controls"
          id="controls"
          why="What else could have made this number? Each question opens its own plot."
        >
          <ControlsTable
            controls={result.controls.map(controlNumbers)}
            scheme={nullWords(recipe.null)}
            fileName={fileName}
          />
        </Section>
      )}
      <ViewSections
        views={views}
        window={recipe.window}
        draws={result.null?.draws ?? 0}
        isRoot={recipe.transform === 'sqrt'}
        fileName={fileName}
      />
      {result.perLevel.length > 1 && (
        <Section title="How true" id="levels" why="Is it biased at the ends of the scale?">
          <div className="figs" style={{ gridTemplateColumns: 'minmax(0, 1fr) minmax(0, 1fr)' }}>
            <LevelsFigure result={result} label={labelWords(recipe.label)} fileName={fileName} />
            <LevelsTable result={result} />
          </div>
        </Section>
      )}
      {result.warnings.length > 0 && (
        <Section title="Warnings" id="warnings" why="What the engine noticed while it ran.">
          <ProblemList problems={result.warnings} />
        </Section>
      )}
      <Section
        title="Leak report"
        id="leaks"
        why={`Every fitted step and the rows it saw, in ${nFolds} folds.`}
      >
        <LeakReport recipe={recipe} result={result} />
      </Section>
      <Section title="Record" id="record" why="Enough to get the same numbers again.">
        <ReadoutRecord readout={readout} labelKind={labelKind} fileName={fileName} />
      </Section>
    </TrialCursorProvider>
  );
}
