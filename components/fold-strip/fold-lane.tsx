import { memo } from 'react';
import { foldColour } from '@/components/fold-strip/fold-colour';
import type { FoldRun } from '@/components/fold-strip/fold-runs';

const round = (value: number): number => Math.round(value * 10) / 10;

/**
 * Folds as heights, 1 at the top: contiguous folds make a stair whose hatched ends are the purge gap, woven folds a
 * weave of stems.
 */
export const FoldLane = memo(function FoldLane({
  values,
  nFolds,
  purgeTrials,
  runs,
  x,
  pxPerTrial,
  y,
  height,
}: {
  values: readonly (number | null)[];
  nFolds: number;
  purgeTrials: number;
  runs: readonly FoldRun[] | null;
  x: (trial: number) => number;
  pxPerTrial: number;
  y: number;
  height: number;
}) {
  const step = height / nFolds;
  const bar = Math.max(1, Math.min(6, step - (step > 4 ? 2 : 0.4)));
  if (!runs) {
    const stems = Array.from({ length: nFolds }, () => '');
    values.forEach((fold, trial) => {
      if (fold !== null)
        stems[fold] += `M${round(x(trial + 0.5))} ${round(y + fold * step)}v${round(Math.max(1, step - 1))}`;
    });
    return stems.map((d, fold) => (
      <path key={fold} d={d} style={{ stroke: foldColour(fold), strokeWidth: 1.3, fill: 'none' }} />
    ));
  }
  const lastTrial = values.length;
  return runs.map(({ fold, from, to }, index) => {
    const top = round(y + fold * step);
    const before = Math.min(purgeTrials, from) * pxPerTrial;
    const after = Math.min(purgeTrials, lastTrial - to) * pxPerTrial;
    const late = index === runs.length - 1;
    return (
      <g key={fold}>
        <rect
          x={round(x(from))}
          y={top}
          width={round((to - from) * pxPerTrial)}
          height={bar}
          style={{ fill: foldColour(fold) }}
        />
        {before > 0 && (
          <rect
            x={round(x(from) - before)}
            y={top}
            width={round(before)}
            height={bar}
            style={{ fill: 'url(#hg)' }}
          />
        )}
        {after > 0 && (
          <rect x={round(x(to))} y={top} width={round(after)} height={bar} style={{ fill: 'url(#hg)' }} />
        )}
        {nFolds <= 12 && (
          <text
            className="strong"
            x={late ? x(from) - before - 5 : x(to) + after + 5}
            y={top + 7}
            textAnchor={late ? 'end' : 'start'}
          >
            {fold + 1}
          </text>
        )}
      </g>
    );
  });
});
