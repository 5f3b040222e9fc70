'use client';
import { useState } from 'react';
import { axisTicks } from '@/components/charts/axis-ticks';
import { chartNumber } from '@/components/charts/chart-number';
import styles from '@/components/charts/figure.module.css';
import { jitter } from '@/components/charts/jitter';
import { LeftAxis } from '@/components/charts/left-axis';
import { linearScale } from '@/components/charts/linear-scale';
import { PlotCursor } from '@/components/charts/plot-cursor';
import { useWidth } from '@/components/charts/use-width';

/** R² of random subsets of one size. */
export interface SizePoint {
  size: number;
  mean: number | null;
  low: number | null;
  high: number | null;
  values: readonly (number | null)[];
}

/** R² against the number of units or of training trials, on a log axis: dots the subsets, bars their means. */
export function SizeCurve({
  points,
  title,
  height = 270,
}: {
  points: readonly SizePoint[];
  title: string;
  height?: number;
}) {
  const [holder, width] = useWidth<HTMLDivElement>(508);
  const [at, setAt] = useState(-1);
  const known = points
    .flatMap((point) => [...point.values, point.mean])
    .filter((value): value is number => value !== null);
  const ticks = axisTicks(Math.min(0, ...known), Math.max(0, ...known), 5);
  const y = linearScale(ticks.values[0], ticks.values[ticks.values.length - 1], height - 46, 24);
  const low = Math.log2(points[0]?.size ?? 1);
  const high = Math.log2(points[points.length - 1]?.size ?? 2);
  const log = linearScale(low === high ? low - 1 : low, high, 60, width - 20);
  const x = (size: number): number => log(Math.log2(size));
  const means = points.flatMap((point) =>
    point.mean === null ? [] : [`${x(point.size).toFixed(1)} ${y(point.mean).toFixed(1)}`],
  );
  const here = points[at];
  const spoken = here
    ? `${here.size}: mean R² ${here.mean === null ? 'not known' : chartNumber(here.mean, 3)}${here.low === null || here.high === null ? '' : `, middle 95 % of subsets ${chartNumber(here.low, 3)} to ${chartNumber(here.high, 3)}`}`
    : '';
  return (
    <div ref={holder}>
      <PlotCursor
        name={`R² against ${title}`}
        place={at}
        count={points.length}
        spoken={spoken}
        leap={1}
        onMove={setAt}
        onPointer={(clientX, _y, box) => {
          const px = clientX - box.left;
          let best = -1;
          let least = Infinity;
          points.forEach((point, index) => {
            if (Math.abs(x(point.size) - px) < least) [best, least] = [index, Math.abs(x(point.size) - px)];
          });
          setAt(best);
        }}
      >
        <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
          <LeftAxis scale={y} x={44} ticks={ticks.values} decimals={ticks.decimals} title="R², held-out" />
          <path
            className="ax"
            d={`M${log.range[0]} ${height - 40}H${log.range[1]}${points.map((point) => `M${x(point.size)} ${height - 40}v4`).join('')}`}
          />
          {points.map((point, index) => (
            <text key={point.size} x={x(point.size)} y={height - 24} textAnchor="middle">
              {index === points.length - 1 || x(points[index + 1].size) - x(point.size) > 20
                ? chartNumber(point.size, 0)
                : ''}
            </text>
          ))}
          <text className="ttl" x={(log.range[0] + log.range[1]) / 2} y={height - 7} textAnchor="middle">
            {title} (log scale)
          </text>
          <path className="zero" d={`M50 ${y(0)}H${width - 10}`} />
          <path
            className="pts"
            style={{ strokeWidth: 2.8, opacity: 'calc(0.45 * var(--dot))' }}
            d={points
              .flatMap((point) =>
                point.values.map((value, draw) =>
                  value === null
                    ? ''
                    : `M${(x(point.size) + (point.values.length > 1 ? jitter(draw) * 9 : 0)).toFixed(1)} ${y(value).toFixed(1)}h0`,
                ),
              )
              .join('')}
          />
          <path className="data" d={`M${means.join('L')}`} />
          <path
            className="inkl"
            style={{ strokeWidth: 2.4 }}
            d={points
              .map((point) => (point.mean === null ? '' : `M${x(point.size) - 7} ${y(point.mean)}h14`))
              .join('')}
          />
          {here && here.mean !== null && (
            <circle
              data-screen-only=""
              cx={x(here.size)}
              cy={y(here.mean)}
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
