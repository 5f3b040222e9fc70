'use client';
import { useMemo } from 'react';
import { axisTicks } from '@/components/charts/axis-ticks';
import { BottomAxis } from '@/components/charts/bottom-axis';
import { chartNumber } from '@/components/charts/chart-number';
import { LeftAxis } from '@/components/charts/left-axis';
import { linearScale, type LinearScale } from '@/components/charts/linear-scale';
import { PlotCursor } from '@/components/charts/plot-cursor';
import { useTrialCursor, useTrialCursorStore } from '@/components/charts/trial-cursor';
import { useWidth } from '@/components/charts/use-width';
import { runningMean } from '@/components/session/running-mean';
import { formatValue } from '@/lib/format/format-value';

function linePath(values: readonly (number | null)[], x: LinearScale, y: LinearScale): string {
  let open = false;
  return values
    .map((value, index) => {
      if (value === null) {
        open = false;
        return '';
      }
      const step = `${open ? 'L' : 'M'}${x(index).toFixed(1)} ${y(value).toFixed(1)}`;
      open = true;
      return step;
    })
    .join('');
}

function extent(values: readonly (number | null)[]): [number, number] {
  const present = values.filter((value) => value !== null);
  return present.length === 0
    ? [0, 1]
    : [present.reduce((a, b) => Math.min(a, b)), present.reduce((a, b) => Math.max(a, b))];
}

/** The label (running mean) and the population rate against trial order: whether either drifts. */
export function OrderPlot({
  label,
  labelName,
  rateHz,
  width: wanted = 712,
  height = 250,
}: {
  label: readonly (number | null)[];
  labelName: string;
  /** Mean rate over the units of each trial, spikes/s. */
  rateHz: readonly (number | null)[];
  width?: number;
  height?: number;
}) {
  const [holder, width] = useWidth<HTMLDivElement>(wanted);
  const store = useTrialCursorStore();
  const n = label.length;
  const drawn = useMemo(() => {
    const smoothLabel = runningMean(label, 25);
    const smoothRate = runningMean(rateHz, 25);
    const labelTicks = axisTicks(...extent(label), 2);
    const rateTicks = axisTicks(...extent(rateHz), 3);
    return { smoothLabel, smoothRate, labelTicks, rateTicks };
  }, [label, rateHz]);
  const x = linearScale(0, Math.max(1, n - 1), 50, width - 12);
  const yLabel = linearScale(
    drawn.labelTicks.values[0],
    drawn.labelTicks.values[drawn.labelTicks.values.length - 1],
    72,
    20,
  );
  const yRate = linearScale(
    drawn.rateTicks.values[0],
    drawn.rateTicks.values[drawn.rateTicks.values.length - 1],
    height - 46,
    112,
  );
  const trialTicks = [
    0,
    ...axisTicks(0, n, Math.max(2, Math.floor(width / 120)), true)
      .values.filter((t) => t > 0 && t < n - n / 12)
      .map((t) => t - 1),
    n - 1,
  ];
  const dots = useMemo(
    () =>
      rateHz
        .map((value, index) => (value === null ? '' : `M${x(index).toFixed(1)} ${yRate(value).toFixed(1)}h0`))
        .join(''),
    // x and yRate follow from these.
    // eslint-disable-next-line react-hooks/exhaustive-deps
    [rateHz, width, height],
  );
  return (
    <div ref={holder}>
      <OrderCursor
        n={n}
        labelName={labelName}
        label={label}
        rateHz={rateHz}
        onPointer={(clientX, box) => {
          const trial = Math.round(x.invert(clientX - box.left));
          if (trial >= 0 && trial < n) store.set({ at: trial });
        }}
      >
        <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
          <LeftAxis
            scale={yLabel}
            x={44}
            ticks={drawn.labelTicks.values}
            decimals={drawn.labelTicks.decimals}
            title={`${labelName}, 25-trial mean`}
            titleY={10}
          />
          <path className="data" style={{ strokeWidth: 1.6 }} d={linePath(drawn.smoothLabel, x, yLabel)} />
          <LeftAxis
            scale={yRate}
            x={44}
            ticks={drawn.rateTicks.values}
            decimals={drawn.rateTicks.decimals}
            title="rate per unit, spikes/s"
            titleY={100}
          />
          <path className="pts" style={{ strokeWidth: 1.8, opacity: 'calc(0.35 * var(--dot))' }} d={dots} />
          <path className="inkl" style={{ strokeWidth: 1.6 }} d={linePath(drawn.smoothRate, x, yRate)} />
          <BottomAxis
            scale={x}
            y={height - 40}
            ticks={trialTicks}
            decimals={0}
            title="trial"
            text={(value) => chartNumber(value + 1, 0)}
          />
          <OrderRing rateHz={rateHz} x={x} y={yRate} top={19} bottom={height - 40} />
        </svg>
      </OrderCursor>
    </div>
  );
}

function OrderRing({
  rateHz,
  x,
  y,
  top,
  bottom,
}: {
  rateHz: readonly (number | null)[];
  x: LinearScale;
  y: LinearScale;
  top: number;
  bottom: number;
}) {
  const at = useTrialCursor((state) => state.at);
  const range = useTrialCursor((state) => state.range);
  const value = at === null ? null : rateHz[at];
  return (
    <g data-screen-only="">
      {range && <path className="inkl" d={`M${x(range[0])} ${top}V${top - 4}H${x(range[1])}V${top}`} />}
      {at !== null && (
        <path
          d={`M${x(at)} ${top}V${bottom}`}
          style={{ stroke: 'var(--focus-ink)', strokeWidth: 1, opacity: 0.6 }}
        />
      )}
      {at !== null && value != null && (
        <circle
          cx={x(at)}
          cy={y(value)}
          r="5.5"
          style={{ fill: 'none', stroke: 'var(--focus-ink)', strokeWidth: 1.8 }}
        />
      )}
    </g>
  );
}

function OrderCursor({
  n,
  labelName,
  label,
  rateHz,
  onPointer,
  children,
}: {
  n: number;
  labelName: string;
  label: readonly (number | null)[];
  rateHz: readonly (number | null)[];
  onPointer: (clientX: number, box: DOMRect) => void;
  children: React.ReactNode;
}) {
  const store = useTrialCursorStore();
  const at = useTrialCursor((state) => state.at);
  const value = at === null ? null : label[at];
  const rate = at === null ? null : rateHz[at];
  return (
    <PlotCursor
      name={`${labelName} and rate against trial order`}
      place={at ?? -1}
      count={n}
      spoken={
        at === null
          ? ''
          : `trial ${at + 1}, label ${value == null ? 'missing' : formatValue(value)}, rate ${rate == null ? 'missing' : chartNumber(rate, 1)} spikes/s`
      }
      onMove={(trial) => store.set({ at: trial < 0 ? null : trial })}
      onPointer={(clientX, _clientY, box) => onPointer(clientX, box)}
    >
      {children}
    </PlotCursor>
  );
}
