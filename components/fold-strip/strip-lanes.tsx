import { memo } from 'react';
import { chartNumber } from '@/components/charts/chart-number';
import { FoldLane } from '@/components/fold-strip/fold-lane';
import type { FoldRun } from '@/components/fold-strip/fold-runs';
import { residualScale } from '@/components/fold-strip/residual-scale';
import type { StripData } from '@/components/fold-strip/strip-data';
import type { StripLayout } from '@/components/fold-strip/strip-layout';
import { formatValue } from '@/lib/format/format-value';

const round = (value: number): number => Math.round(value * 10) / 10;

function range(values: readonly (number | null)[]): [number, number] {
  let low = Infinity;
  let high = -Infinity;
  for (const value of values) {
    if (value === null) continue;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  return low <= high ? [low, high] : [0, 1];
}

/** The still part of a fold strip: lanes, block borders and the trial axis. Drawn once per data, however the cursor moves. */
export const StripLanes = memo(function StripLanes({
  data,
  layout,
  runs,
  starts,
}: {
  data: StripData;
  layout: StripLayout;
  runs: readonly FoldRun[] | null;
  starts: readonly number[];
}) {
  const { left, pxPerTrial, top, bottom, lanes } = layout;
  const n = data.nTrials;
  const x = (trial: number): number => left + trial * pxPerTrial;
  const out = new Set(data.excluded.map((entry) => entry.trial));
  const stem = round(pxPerTrial * 0.6);
  const every = [80, 100, 200, 250, 500, 1000].find((step) => step * pxPerTrial >= 100) ?? 1000;
  const marks = [0, ...Array.from({ length: Math.floor(n / every) }, (_, k) => (k + 1) * every - 1)];
  if (n - 1 - marks[marks.length - 1] > 30 / pxPerTrial) marks.push(n - 1);
  return (
    <g>
      {[...starts, n].map((trial) => (
        <path key={trial} className="grid" d={`M${round(x(trial))} ${top - 3}V${bottom}`} />
      ))}
      {data.block &&
        starts.map((trial, index) => {
          const room = ((starts[index + 1] ?? n) - trial) * pxPerTrial;
          const words = `${data.block?.name} ${data.block?.values[trial] ?? '–'}`;
          return room > words.length * 6.8 ? (
            <text key={trial} x={x(trial) + 3} y={12}>
              {words}
            </text>
          ) : null;
        })}
      {lanes.map(({ lane, y, height }) => {
        if (lane === 'fold' && data.folds) {
          const { nFolds } = data.folds;
          return (
            <g key={lane}>
              <text className="lab" x="0" y={y + height / 2 + 4}>
                fold
              </text>
              <text x={left - 8} y={y + 7} textAnchor="end">
                1
              </text>
              <text x={left - 8} y={y + height} textAnchor="end">
                {nFolds}
              </text>
              <FoldLane
                values={data.folds.values}
                nFolds={nFolds}
                purgeTrials={data.folds.purgeTrials}
                runs={runs}
                x={x}
                pxPerTrial={pxPerTrial}
                y={y}
                height={height}
              />
            </g>
          );
        }
        if (lane === 'label' && data.label) {
          const { values } = data.label;
          const [low, high] = range(values);
          const foot = Math.min(low, 0 < high ? 0 : low);
          const d = values
            .map((value, trial) => {
              if (value === null || out.has(trial)) return '';
              const share = high === foot ? 0.5 : (value - foot) / (high - foot);
              return `M${round(x(trial + 0.5))} ${y + height}V${round(y + height - 2 - share * (height - 2))}`;
            })
            .join('');
          return (
            <g key={lane}>
              <text className="lab" x="0" y={y + height / 2 + 4}>
                label
              </text>
              <text x={left - 8} y={y + 8} textAnchor="end">
                {formatValue(high, 3)}
              </text>
              <text x={left - 8} y={y + height} textAnchor="end">
                {formatValue(foot, 3)}
              </text>
              <path d={d} style={{ stroke: 'var(--ink-2)', strokeWidth: stem, fill: 'none' }} />
            </g>
          );
        }
        if (lane === 'column' && data.column) {
          const { values, name } = data.column;
          const [low, high] = range(values);
          let open = false;
          const d = values
            .map((value, trial) => {
              if (value === null) {
                open = false;
                return '';
              }
              const share = high === low ? 0.5 : (value - low) / (high - low);
              const point = `${round(x(trial + 0.5))} ${round(y + height - share * height)}`;
              const step = open ? `L${point}` : `M${point}`;
              open = true;
              return step;
            })
            .join('');
          return (
            <g key={lane}>
              <text className="lab" x="0" y={y + height / 2 + 4}>
                {name.length > 9 ? `${name.slice(0, 8)}…` : name}
              </text>
              <text x={left - 8} y={y + 8} textAnchor="end">
                {formatValue(high, 3)}
              </text>
              <text x={left - 8} y={y + height} textAnchor="end">
                {formatValue(low, 3)}
              </text>
              <path d={d} style={{ stroke: 'var(--ink-3)', strokeWidth: 1, fill: 'none' }} />
            </g>
          );
        }
        if (lane === 'excluded') {
          return (
            <g key={lane}>
              <text className="lab" x="0" y={y + 11}>
                excluded
              </text>
              <path className="grid" d={`M${x(0)} ${y + height / 2}H${x(n)}`} />
              <path
                d={data.excluded
                  .map(({ trial }) => `M${round(x(trial + 0.5))} ${y + 1}v${height - 2}`)
                  .join('')}
                style={{ stroke: 'var(--ink)', strokeWidth: Math.max(stem, 1.2), fill: 'none' }}
              />
            </g>
          );
        }
        if (lane === 'residual' && data.label && data.predicted) {
          const { values, limit, outlier } = residualScale(data.label.values, data.predicted);
          const middle = y + height / 2;
          const at = (value: number): number =>
            round(middle - (Math.max(-limit, Math.min(limit, value)) / limit) * (height / 2));
          const decimals = limit < 1 ? 1 : 0;
          return (
            <g key={lane}>
              <text className="lab" x="0" y={middle + 4}>
                residual
              </text>
              <text x={left - 8} y={y + 8} textAnchor="end">
                {chartNumber(limit, decimals + (limit < 0.1 ? 2 : 0), true)}
              </text>
              <text x={left - 8} y={y + height} textAnchor="end">
                {chartNumber(-limit, decimals + (limit < 0.1 ? 2 : 0))}
              </text>
              <path className="ax" d={`M${x(0)} ${middle}H${x(n)}`} />
              <path
                d={values
                  .map((value, trial) =>
                    value === null ? '' : `M${round(x(trial + 0.5))} ${middle}V${at(value)}`,
                  )
                  .join('')}
                style={{ stroke: 'var(--verdigris)', strokeWidth: stem, fill: 'none' }}
              />
              <path
                d={values
                  .map((value, trial) =>
                    value === null || Math.abs(value) <= outlier
                      ? ''
                      : `M${round(x(trial + 0.5))} ${at(value)}h0`,
                  )
                  .join('')}
                style={{ stroke: 'var(--ink)', strokeWidth: 3.4, strokeLinecap: 'round', fill: 'none' }}
              />
            </g>
          );
        }
        return null;
      })}
      <text className="lab" x="0" y={bottom + 14}>
        trial
      </text>
      {marks.map((trial, index) => (
        <text
          key={trial}
          x={x(trial + 0.5)}
          y={bottom + 14}
          textAnchor={index === 0 ? 'start' : trial === n - 1 ? 'end' : 'middle'}
        >
          {chartNumber(trial + 1, 0)}
        </text>
      ))}
    </g>
  );
});
