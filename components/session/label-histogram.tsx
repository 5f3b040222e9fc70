'use client';
import { useMemo, useState } from 'react';
import { axisTicks } from '@/components/charts/axis-ticks';
import { BottomAxis } from '@/components/charts/bottom-axis';
import figureStyles from '@/components/charts/figure.module.css';
import { LeftAxis } from '@/components/charts/left-axis';
import { levelTicks } from '@/components/charts/level-ticks';
import { linearScale } from '@/components/charts/linear-scale';
import { PlotCursor } from '@/components/charts/plot-cursor';
import { useWidth } from '@/components/charts/use-width';
import { labelBars, type LabelBar } from '@/components/session/label-bars';
import { formatValue } from '@/lib/format/format-value';

/** How the label is distributed over the trials that are in. */
export function LabelHistogram({
  values,
  label,
  height = 240,
}: {
  values: readonly number[];
  label: string;
  height?: number;
}) {
  const [holder, width] = useWidth<HTMLDivElement>(338);
  const [at, setAt] = useState(-1);
  const { bars, isLevels } = useMemo(() => labelBars(values), [values]);
  const low = bars[0]?.from ?? 0;
  const high = bars[bars.length - 1]?.to ?? 1;
  const xTicks =
    isLevels && bars.length > 1 && bars.length <= 6 && width / bars.length > 50
      ? levelTicks(bars.map((bar) => bar.from))
      : axisTicks(low, high, Math.max(2, Math.min(6, Math.floor(width / 70))));
  const most = Math.max(1, ...bars.map((bar) => bar.count));
  const yTicks = axisTicks(0, most, 4);
  const pad = isLevels ? (high - low || 1) * 0.06 : 0;
  const x = linearScale(
    Math.min(low - pad, xTicks.values[0]),
    Math.max(high + pad, xTicks.values[xTicks.values.length - 1]),
    44,
    width - 12,
  );
  const y = linearScale(0, yTicks.values[yTicks.values.length - 1], height - 42, 24);
  const gap =
    bars.length > 1 ? Math.min(...bars.slice(1).map((bar, k) => x(bar.from) - x(bars[k].from))) : 40;
  const half = Math.max(2, Math.min(18, gap * 0.32));
  const edges = (bar: LabelBar): [number, number] =>
    isLevels ? [x(bar.from) - half, x(bar.from) + half] : [x(bar.from) + 0.5, x(bar.to) - 0.5];
  const here = bars[at];
  const spoken = here
    ? `${isLevels ? formatValue(here.from) : `${formatValue(here.from)} to ${formatValue(here.to)}`}: ${here.count} of ${values.length} trials`
    : '';
  const width0 = bars[0] ? bars[0].to - bars[0].from : 0;
  return (
    <div ref={holder}>
      <PlotCursor
        name={`Distribution of ${label}`}
        place={at}
        count={bars.length}
        spoken={spoken}
        leap={5}
        onMove={setAt}
        onPointer={(clientX, _clientY, box) => {
          const px = clientX - box.left;
          const found = bars.findIndex((bar) => px >= edges(bar)[0] - 2 && px <= edges(bar)[1] + 2);
          if (found >= 0) setAt(found);
        }}
      >
        <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
          <BottomAxis
            scale={x}
            y={height - 40}
            ticks={xTicks.values}
            decimals={xTicks.decimals}
            title={label}
          />
          <LeftAxis
            scale={y}
            x={38}
            ticks={yTicks.values}
            decimals={0}
            title={isLevels ? 'trials per level' : `trials per ${formatValue(width0)}`}
          />
          {bars.map((bar, index) => {
            const [a, b] = edges(bar);
            return (
              <rect
                key={bar.from}
                x={a}
                y={y(bar.count)}
                width={Math.max(1, b - a)}
                height={height - 42 - y(bar.count)}
                style={{ fill: 'var(--verdigris)', opacity: index === at ? 0.85 : 0.55 }}
              />
            );
          })}
        </svg>
      </PlotCursor>
      <p className={figureStyles.spoken} aria-hidden="true">
        {spoken && <span className="n">{spoken}</span>}
      </p>
    </div>
  );
}
