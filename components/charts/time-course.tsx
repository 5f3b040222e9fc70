'use client';
import { useState } from 'react';
import { axisTicks } from '@/components/charts/axis-ticks';
import { BottomAxis } from '@/components/charts/bottom-axis';
import { chartNumber } from '@/components/charts/chart-number';
import styles from '@/components/charts/figure.module.css';
import { LeftAxis } from '@/components/charts/left-axis';
import { linearScale } from '@/components/charts/linear-scale';
import { PlotCursor } from '@/components/charts/plot-cursor';
import { useWidth } from '@/components/charts/use-width';

/** Held-out R² of one sliding window; `centreMs` from the alignment event. */
export interface TimeCoursePoint {
  centreMs: number;
  r2: number | null;
  interval: { low: number; high: number } | null;
  nullLow: number | null;
  nullHigh: number | null;
  pFamily: number | null;
}

/** R² in sliding windows: line and band in verdigris, the shuffles hatched, a bar under the plot where corrected. */
export function TimeCourse({
  points,
  maximumQ95,
  window,
  height = 320,
}: {
  points: readonly TimeCoursePoint[];
  /** 95 % of the shuffles' largest value over all windows. */
  maximumQ95: number | null;
  /** The readout's own window. */
  window: { startMs: number; endMs: number };
  height?: number;
}) {
  const [holder, width] = useWidth<HTMLDivElement>(628);
  const [at, setAt] = useState(-1);
  const all = points.flatMap((point) => [
    point.r2,
    point.interval?.low,
    point.interval?.high,
    point.nullLow,
    point.nullHigh,
  ]);
  const known = [...all, maximumQ95, 0].filter((value): value is number => typeof value === 'number');
  const first = points[0]?.centreMs ?? 0;
  const last = points[points.length - 1]?.centreMs ?? 1;
  const step = points.length > 1 ? points[1].centreMs - points[0].centreMs : 1;
  const low = Math.min(first, window.startMs);
  const high = Math.max(last, window.endMs);
  const xTicks = axisTicks(low, high, width < 420 ? 4 : 7, true);
  const yTicks = axisTicks(Math.min(...known), Math.max(...known), 6);
  const x = linearScale(low, high, 56, width - 14);
  const y = linearScale(yTicks.values[0], yTicks.values[yTicks.values.length - 1], height - 60, 40);
  const band = (
    top: (p: TimeCoursePoint) => number | null | undefined,
    low: (p: TimeCoursePoint) => number | null | undefined,
  ): string => {
    const there = points.filter((point) => typeof top(point) === 'number' && typeof low(point) === 'number');
    if (there.length < 2) return '';
    const up = there.map((point) => `${x(point.centreMs).toFixed(1)} ${y(top(point) as number).toFixed(1)}`);
    const down = [...there]
      .reverse()
      .map((point) => `${x(point.centreMs).toFixed(1)} ${y(low(point) as number).toFixed(1)}`);
    return `M${[...up, ...down].join('L')}Z`;
  };
  const line = points
    .filter((point) => point.r2 !== null)
    .map((point) => `${x(point.centreMs).toFixed(1)} ${y(point.r2 ?? 0).toFixed(1)}`);
  const here = points[at];
  const spoken = here
    ? `centre ${chartNumber(here.centreMs, 0)} ms: R² ${here.r2 === null ? 'not known' : chartNumber(here.r2, 3)}${here.pFamily === null ? '' : `, corrected p ${chartNumber(here.pFamily, 3)}`}`
    : '';
  return (
    <div ref={holder}>
      <PlotCursor
        name="R² over time"
        place={at}
        count={points.length}
        spoken={spoken}
        leap={5}
        onMove={setAt}
        onPointer={(clientX, _y, box) => {
          const ms = x.invert(clientX - box.left);
          setAt(Math.max(0, Math.min(points.length - 1, Math.round((ms - first) / step))));
        }}
      >
        <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
          <BottomAxis
            scale={x}
            y={height - 40}
            ticks={xTicks.values}
            decimals={0}
            title="centre of the window, ms from the alignment event"
          />
          <LeftAxis scale={y} x={44} ticks={yTicks.values} decimals={yTicks.decimals} title="R², held-out" />
          <path
            className="hnul"
            d={band(
              (p) => p.nullHigh,
              (p) => p.nullLow,
            )}
          />
          <path className="zero" d={`M50 ${y(0)}H${width - 10}`} />
          {x.domain[0] < 0 && x.domain[1] > 0 && <path className="grid" d={`M${x(0)} 30V${height - 60}`} />}
          {maximumQ95 !== null && (
            <>
              <path
                className="nul"
                style={{ strokeDasharray: '5 3', strokeWidth: 1 }}
                d={`M50 ${y(maximumQ95)}H${width - 10}`}
              />
              <text className="m" x={54} y={y(maximumQ95) - 5}>
                95 % of the largest
              </text>
            </>
          )}
          <path
            className="fdata"
            style={{ opacity: 0.18 }}
            d={band(
              (p) => p.interval?.high,
              (p) => p.interval?.low,
            )}
          />
          <path className="data" d={`M${line.join('L')}`} />
          {points.map((point) =>
            point.pFamily !== null && point.pFamily <= 0.05 ? (
              <rect
                key={point.centreMs}
                className="fdata"
                x={x(point.centreMs - step / 2)}
                y={height - 54}
                width={x(step) - x(0) + 0.4}
                height="4"
              />
            ) : null,
          )}
          <path className="inkl" d={`M${x(window.startMs)} 30v-5H${x(window.endMs)}v5`} />
          <text className="lab" x={(x(window.startMs) + x(window.endMs)) / 2} y="20" textAnchor="middle">
            this readout
          </text>
          {here && here.r2 !== null && (
            <circle
              data-screen-only=""
              cx={x(here.centreMs)}
              cy={y(here.r2)}
              r="5.5"
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
