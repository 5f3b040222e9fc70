'use client';
import { useWidth } from '@/components/charts/use-width';
import { foldColour } from '@/components/fold-strip/fold-colour';
import { formatCount } from '@/lib/format/format-count';

/**
 * What the folds will look like over the trials: a stair of contiguous folds with their purge gaps, or the weave of random
 * ones (which trial goes where is drawn only by the run, from the seed).
 */
export function FoldPreview({
  kind,
  k,
  purgeTrials,
  nTrials,
  groups,
}: {
  kind: 'stratified' | 'contiguous' | 'leaveOneGroupOut';
  k: number;
  purgeTrials: number;
  nTrials: number;
  /** Group of each trial, for leaving one group out. */
  groups: readonly (number | string | null)[] | null;
}) {
  const [holder, width] = useWidth<HTMLDivElement>(452);
  const shown = Math.min(width, 460);
  const px = shown / Math.max(1, nTrials);
  const levels = groups ? [...new Set(groups.filter((value) => value !== null))] : [];
  const nFolds = kind === 'leaveOneGroupOut' ? levels.length : k;
  if (!Number.isInteger(nFolds) || nFolds < 2 || nFolds > 40 || nTrials < nFolds) return null;
  const step = Math.max(2, 40 / nFolds);
  const foot = Math.ceil(nFolds * step) + 4;
  const bar = Math.max(1.4, step - (step > 4 ? 2 : 0.5));
  const said =
    kind === 'contiguous'
      ? `${nFolds} contiguous folds${purgeTrials > 0 ? ` with purge gaps of ${purgeTrials} trials` : ''}`
      : kind === 'stratified'
        ? `${nFolds} random folds woven over all trials`
        : `${nFolds} folds, one a group`;
  return (
    <div ref={holder} style={{ marginTop: 12 }}>
      <svg
        width={shown}
        height={foot + 18}
        viewBox={`0 0 ${shown} ${foot + 18}`}
        role="img"
        aria-label={said}
      >
        {kind === 'contiguous' &&
          Array.from({ length: nFolds }, (_, fold) => {
            const from = Math.round((fold * nTrials) / nFolds);
            const to = Math.round(((fold + 1) * nTrials) / nFolds);
            const before = Math.min(purgeTrials, from);
            const after = Math.min(purgeTrials, nTrials - to);
            const y = fold * step;
            return (
              <g key={fold}>
                <rect
                  x={from * px}
                  y={y}
                  width={(to - from) * px}
                  height={bar}
                  style={{ fill: foldColour(fold) }}
                />
                {before > 0 && (
                  <rect
                    x={(from - before) * px}
                    y={y}
                    width={before * px}
                    height={bar}
                    style={{ fill: 'url(#hg)' }}
                  />
                )}
                {after > 0 && (
                  <rect x={to * px} y={y} width={after * px} height={bar} style={{ fill: 'url(#hg)' }} />
                )}
              </g>
            );
          })}
        {kind === 'stratified' &&
          Array.from({ length: nFolds }, (_, fold) => (
            <path
              key={fold}
              style={{ stroke: foldColour(fold), strokeWidth: 1.2, fill: 'none' }}
              d={Array.from({ length: Math.floor(shown / (2 * nFolds)) }, (_unused, at) => {
                // A fixed weave that only stands for "anywhere"; the places carry no information.
                const slot = (fold * 7 + at * 3) % nFolds;
                return `M${((at * nFolds + slot) * 2 + 1).toFixed(1)} ${(fold * step).toFixed(1)}v${(step - 0.8).toFixed(1)}`;
              }).join('')}
            />
          ))}
        {kind === 'leaveOneGroupOut' &&
          levels.map((level, fold) => (
            <path
              key={String(level)}
              style={{ stroke: foldColour(fold), strokeWidth: Math.max(0.8, px), fill: 'none' }}
              d={(groups ?? [])
                .map((value, trial) =>
                  value === level
                    ? `M${((trial + 0.5) * px).toFixed(1)} ${(fold * step).toFixed(1)}v${bar.toFixed(1)}`
                    : '',
                )
                .join('')}
            />
          ))}
        <path className="ax" d={`M0 ${foot}H${shown}`} />
        <text x="0" y={foot + 14}>
          trial 1
        </text>
        <text x={shown} y={foot + 14} textAnchor="end">
          {formatCount(nTrials)}
        </text>
      </svg>
    </div>
  );
}
