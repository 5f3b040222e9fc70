'use client';
import { Figure } from '@/components/charts/figure';
import { GeneralisationMap } from '@/components/charts/generalisation-map';
import { SizeCurve } from '@/components/charts/size-curve';
import { TimeCourse } from '@/components/charts/time-course';
import { SingleUnitsFigure } from '@/components/readout/single-units-figure';
import type { ViewNumbers } from '@/components/readout/view-numbers';
import { WeightsFigure } from '@/components/readout/weights-figure';
import { numbers } from '@/components/ui/numbers';
import { formatCount } from '@/lib/format/format-count';
import { formatValue } from '@/lib/format/format-value';

/** One view of a readout as a figure with caption, table and downloads. */
export function ViewFigure({
  view,
  window,
  draws,
  isRoot,
  fileName,
}: {
  view: ViewNumbers;
  window: { startMs: number; endMs: number };
  /** Shuffles that each window or unit was compared with. */
  draws: number;
  isRoot: boolean;
  fileName: string;
}) {
  switch (view.kind) {
    case 'timeCourse': {
      const points = view.windows.map((row) => ({
        centreMs: (row.startMs + row.endMs) / 2,
        r2: row.r2,
        interval: row.testTrialInterval,
        nullLow: row.nullQ05,
        nullHigh: row.nullQ95,
        pFamily: row.pFamily,
      }));
      const overlap = view.stepMs < view.widthMs ? ' Neighbouring windows share bins.' : '';
      const family = view.maximumNull
        ? ` Hatched: middle 90 % of ${formatCount(draws)} shuffles in that window; broken line: 95 % of their largest values over all windows. Bar under the plot: above the null of the largest, so family-wise p at most 0.05 over ${points.length} windows.`
        : '';
      return (
        <Figure
          title="Time course"
          caption={numbers(
            `Held-out R² in sliding windows of ${formatValue(view.widthMs)} ms, step ${formatValue(view.stepMs)} ms, same folds. Band: 95 % test-trial interval, readouts held fixed.${family}${overlap}`,
          )}
          columns={[
            { name: 'from', unit: 'ms' },
            { name: 'to', unit: 'ms' },
            { name: 'R²', decimals: 3 },
            { name: 'low', decimals: 3 },
            { name: 'high', decimals: 3 },
            { name: 'p', decimals: 4 },
            { name: 'corrected p', decimals: 4 },
          ]}
          rows={view.windows.map((row) => [
            row.startMs,
            row.endMs,
            row.r2,
            row.testTrialInterval?.low ?? null,
            row.testTrialInterval?.high ?? null,
            row.p,
            row.pFamily,
          ])}
          fileName={`${fileName}-time-course`}
        >
          <TimeCourse points={points} maximumQ95={view.maximumNull?.quantiles.q95 ?? null} window={window} />
        </Figure>
      );
    }
    case 'temporalGeneralisation': {
      const centres = view.windows.map((row) => (row.startMs + row.endMs) / 2);
      return (
        <Figure
          title="Temporal generalisation"
          caption={numbers(
            `Fitted in one window of ${formatValue(view.widthMs)} ms, tested on held-out trials in another; hatched: below 0. Off the diagonal the code must have stayed the same.${view.windowsOverlap ? ' Windows next to the diagonal share bins.' : ''}`,
          )}
          columns={[
            { name: 'fitted at', unit: 'ms' },
            { name: 'tested at', unit: 'ms' },
            { name: 'R²', decimals: 3 },
          ]}
          rows={centres.flatMap((fitted, i) =>
            centres.map((tested, j) => [fitted, tested, view.r2[i]?.[j] ?? null]),
          )}
          fileName={`${fileName}-temporal-generalisation`}
        >
          <GeneralisationMap centresMs={centres} r2={view.r2} />
        </Figure>
      );
    }
    case 'populationSize':
    case 'learning': {
      const units = view.kind === 'populationSize';
      const points = view.sizes.map((row) => ({
        size: row.size,
        mean: row.mean,
        low: row.q025,
        high: row.q975,
        values: row.values,
      }));
      return (
        <Figure
          title={units ? 'Population size' : 'Learning curve'}
          caption={numbers(
            units
              ? `${view.draws} random subsets of units per size, same folds; dots: subsets; bars: means. The spread is over subsets, not over sessions.`
              : `${view.draws} random parts of each fold’s training trials per size, same held-out trials; dots: draws; bars: means.`,
          )}
          columns={[
            { name: units ? 'units' : 'training trials' },
            { name: 'mean R²', decimals: 3 },
            { name: '2.5 %', decimals: 3 },
            { name: '97.5 %', decimals: 3 },
          ]}
          rows={view.sizes.map((row) => [row.size, row.mean, row.q025, row.q975])}
          fileName={`${fileName}-${units ? 'population-size' : 'learning'}`}
        >
          <SizeCurve points={points} title={units ? 'units in the subset' : 'training trials'} />
        </Figure>
      );
    }
    case 'singleUnits':
      return <SingleUnitsFigure view={view} fileName={fileName} />;
    case 'weights':
      return <WeightsFigure view={view} isRoot={isRoot} fileName={fileName} />;
  }
}
