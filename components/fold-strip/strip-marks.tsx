'use client';
import { useTrialCursor } from '@/components/charts/trial-cursor';
import type { FoldRun } from '@/components/fold-strip/fold-runs';
import type { StripLayout } from '@/components/fold-strip/strip-layout';

/** What moves on a strip: tint of the fold in focus, bracket of the chosen range, cursor line. */
export function StripMarks({
  layout,
  folds,
  runs,
}: {
  layout: StripLayout;
  folds: readonly (number | null)[] | null;
  runs: readonly FoldRun[] | null;
}) {
  const at = useTrialCursor((state) => state.at);
  const range = useTrialCursor((state) => state.range);
  const fold = useTrialCursor((state) => state.fold);
  const { left, pxPerTrial, top, bottom } = layout;
  const x = (trial: number): number => Math.round((left + trial * pxPerTrial) * 10) / 10;
  const run = runs?.find((entry) => entry.fold === fold);
  return (
    <g data-screen-only="">
      {run && (
        <rect
          className="ftint"
          style={{ opacity: 0.7 }}
          x={x(run.from)}
          y={top - 2}
          width={(run.to - run.from) * pxPerTrial}
          height={bottom - top + 2}
        />
      )}
      {fold !== null && !run && folds && (
        <path
          style={{ stroke: 'var(--verdigris-tint)', strokeWidth: pxPerTrial, fill: 'none' }}
          d={folds
            .map((value, trial) => (value === fold ? `M${x(trial + 0.5)} ${top - 2}V${bottom}` : ''))
            .join('')}
        />
      )}
      {range && (
        <path
          className="inkl"
          style={{ strokeWidth: 1.4 }}
          d={`M${x(range[0]) + 4} ${top - 4}H${x(range[0])}V${bottom + 3}H${x(range[1] + 1)}V${top - 4}h-4`}
        />
      )}
      {at !== null && (
        <g transform={`translate(${x(at + 0.5)} 0)`}>
          <path d={`M0 ${top - 5}V${bottom}`} style={{ stroke: 'var(--focus-ink)', strokeWidth: 1.4 }} />
          <path d={`M-4 ${top - 11}h8l-4 6z`} style={{ fill: 'var(--focus-ink)' }} />
        </g>
      )}
    </g>
  );
}
