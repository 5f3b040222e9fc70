'use client';
import { useState } from 'react';
import { axisTicks } from '@/components/charts/axis-ticks';
import { BottomAxis } from '@/components/charts/bottom-axis';
import { chartNumber } from '@/components/charts/chart-number';
import styles from '@/components/charts/figure.module.css';
import { LeftAxis } from '@/components/charts/left-axis';
import { levelTicks } from '@/components/charts/level-ticks';
import { linearScale } from '@/components/charts/linear-scale';
import { PlotCursor } from '@/components/charts/plot-cursor';
import { useWidth } from '@/components/charts/use-width';

/** Bias (held-out minus true) of one level; the interval is that of the mean prediction. */
export interface BiasLevel {
  level: number;
  nTrials: number;
  bias: number;
  sd: number | null;
  meanInterval: { low: number; high: number } | null;
}

/** Bias at each level of the label: disc the mean, thin line ±1 SD, thick line the interval of the mean. */
export function LevelBias({
  levels,
  label,
  height = 270,
}: {
  levels: readonly BiasLevel[];
  label: string;
  height?: number;
}) {
  const [holder, width] = useWidth<HTMLDivElement>(508);
  const [at, setAt] = useState(-1);
  const edges = levels.flatMap(({ level, bias, sd, meanInterval }) => [
    bias - (sd ?? 0),
    bias + (sd ?? 0),
    ...(meanInterval ? [meanInterval.low - level, meanInterval.high - level] : []),
  ]);
  const yTicks = axisTicks(Math.min(0, ...edges), Math.max(0, ...edges), 5);
  const first = levels[0]?.level ?? 0;
  const last = levels[levels.length - 1]?.level ?? 1;
  const xTicks =
    levels.length > 1 && levels.length <= 6 && width / levels.length > 55
      ? levelTicks(levels.map((entry) => entry.level))
      : axisTicks(first, last, Math.max(2, Math.min(5, Math.floor(width / 90))), false);
  const pad = (last - first || 1) * 0.06;
  const x = linearScale(
    Math.min(first - pad, xTicks.values[0]),
    Math.max(last + pad, xTicks.values[xTicks.values.length - 1]),
    52,
    width - 12,
  );
  const y = linearScale(yTicks.values[0], yTicks.values[yTicks.values.length - 1], height - 46, 24);
  const here = levels[at];
  const spoken = here
    ? `level ${chartNumber(here.level)}: ${chartNumber(here.bias, 3, true)} over ${here.nTrials} trials${here.sd === null ? '' : `, SD ${chartNumber(here.sd, 3)}`}`
    : '';
  return (
    <div ref={holder}>
      <PlotCursor
        name={`Bias at each level of ${label}`}
        place={at}
        count={levels.length}
        spoken={spoken}
        leap={1}
        onMove={setAt}
        onPointer={(clientX, _y, box) => {
          const px = clientX - box.left;
          let best = -1;
          let least = Infinity;
          levels.forEach(({ level }, index) => {
            if (Math.abs(x(level) - px) < least) [best, least] = [index, Math.abs(x(level) - px)];
          });
          setAt(best);
        }}
      >
        <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
          <BottomAxis
            scale={x}
            y={height - 40}
            ticks={xTicks.values}
            decimals={xTicks.decimals}
            title={`${label}, true`}
          />
          <LeftAxis
            scale={y}
            x={46}
            ticks={yTicks.values}
            decimals={yTicks.decimals}
            title="held-out minus true"
            text={(value) => chartNumber(value, yTicks.decimals, true)}
          />
          <path className="zero" d={`M52 ${y(0)}H${width - 12}`} />
          {levels.length > 1 && (
            <path
              className="data"
              style={{ strokeWidth: 1.2 }}
              d={`M${levels.map((entry) => `${x(entry.level)} ${y(entry.bias)}`).join('L')}`}
            />
          )}
          {levels.map(({ level, bias, sd, meanInterval }) => (
            <g key={level}>
              {sd !== null && (
                <path
                  className="data"
                  style={{ strokeWidth: 1, opacity: 0.8 }}
                  d={`M${x(level)} ${y(bias - sd)}V${y(bias + sd)}`}
                />
              )}
              {meanInterval && (
                <path
                  className="data"
                  style={{ strokeWidth: 5, opacity: 0.5 }}
                  d={`M${x(level)} ${y(meanInterval.low - level)}V${y(meanInterval.high - level)}`}
                />
              )}
              <circle cx={x(level)} cy={y(bias)} r="4" className="fdata" />
            </g>
          ))}
          {here && (
            <circle
              data-screen-only=""
              cx={x(here.level)}
              cy={y(here.bias)}
              r="7"
              style={{ fill: 'none', stroke: 'var(--focus-ink)', strokeWidth: 1.8 }}
            />
          )}
        </svg>
      </PlotCursor>
      <p className={styles.spoken} aria-hidden="true">
        {spoken && <span className="n">{spoken}</span>}
      </p>
    </div>
  );
}
