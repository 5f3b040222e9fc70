'use client';
import { useRef, type KeyboardEvent, type PointerEvent } from 'react';
import { axisTicks } from '@/components/charts/axis-ticks';
import { BottomAxis } from '@/components/charts/bottom-axis';
import { LeftAxis } from '@/components/charts/left-axis';
import { linearScale } from '@/components/charts/linear-scale';
import { useWidth } from '@/components/charts/use-width';
import styles from '@/components/recipe/window-picker.module.css';
import { formatNumber } from '@/lib/format/format-number';

/** The window chosen on the population rate: two handles that drag, or move by one bin with the arrow keys. */
export function WindowPicker({
  rateHz,
  windowStartMs,
  binWidthMs,
  startMs,
  endMs,
  onChange,
  height = 170,
}: {
  /** One value a bin. */
  rateHz: readonly number[];
  windowStartMs: number;
  binWidthMs: number;
  startMs: number;
  endMs: number;
  onChange: (startMs: number, endMs: number) => void;
  height?: number;
}) {
  const [holder, width] = useWidth<HTMLDivElement>(460);
  const drag = useRef<'start' | 'end' | null>(null);
  const shown = Math.min(width, 520);
  const nBins = rateHz.length;
  const lastMs = windowStartMs + nBins * binWidthMs;
  const foot = height - 40;
  const yTicks = axisTicks(0, Math.max(...rateHz, 0.1), 3);
  const xTicks = axisTicks(windowStartMs, lastMs, shown < 400 ? 4 : 7, true);
  const x = linearScale(windowStartMs, lastMs, 44, shown - 10);
  const y = linearScale(0, yTicks.values[yTicks.values.length - 1], foot, 26);
  const line = rateHz
    .map((rate, bin) => `${x(windowStartMs + (bin + 0.5) * binWidthMs).toFixed(1)} ${y(rate).toFixed(1)}`)
    .join('L');
  const snap = (ms: number): number => {
    const bin = Math.max(0, Math.min(nBins, Math.round((ms - windowStartMs) / binWidthMs)));
    return windowStartMs + bin * binWidthMs;
  };
  const set = (which: 'start' | 'end', ms: number): void => {
    const to = snap(ms);
    if (which === 'start' && to < endMs) onChange(to, endMs);
    if (which === 'end' && to > startMs) onChange(startMs, to);
  };
  const msAt = (event: PointerEvent): number =>
    x.invert(event.clientX - (holder.current?.getBoundingClientRect().left ?? 0));
  const onKeyDown = (which: 'start' | 'end', now: number) => (event: KeyboardEvent) => {
    const step: Record<string, number> = {
      ArrowLeft: -1,
      ArrowDown: -1,
      ArrowRight: 1,
      ArrowUp: 1,
      PageDown: -5,
      PageUp: 5,
    };
    if (event.key in step) set(which, now + step[event.key] * binWidthMs);
    else if (event.key === 'Home') set(which, which === 'start' ? windowStartMs : startMs + binWidthMs);
    else if (event.key === 'End') set(which, which === 'end' ? lastMs : endMs - binWidthMs);
    else return;
    event.preventDefault();
  };
  const valid = Number.isFinite(startMs) && Number.isFinite(endMs);
  const handles = [
    { which: 'start' as const, ms: startMs, name: 'Start of the window' },
    { which: 'end' as const, ms: endMs, name: 'End of the window' },
  ];
  return (
    <div ref={holder} className={styles.holder}>
      <svg
        width={shown}
        height={height}
        viewBox={`0 0 ${shown} ${height}`}
        role="img"
        aria-label="Population rate over the trial"
      >
        {valid && startMs < endMs && (
          <rect
            className="ftint"
            x={x(startMs)}
            y="16"
            width={Math.max(0, x(endMs) - x(startMs))}
            height={foot - 16}
          />
        )}
        <BottomAxis
          scale={x}
          y={height - 38}
          ticks={xTicks.values}
          decimals={0}
          title="ms from the alignment event"
        />
        <LeftAxis
          scale={y}
          x={38}
          ticks={yTicks.values}
          decimals={yTicks.decimals}
          title="population rate, spikes/s per unit"
        />
        {windowStartMs < 0 && lastMs > 0 && <path className="zero" d={`M${x(0)} 16V${foot}`} />}
        <path className="inkl" style={{ strokeWidth: 1.8 }} d={`M${line}`} />
        {valid &&
          handles.map(({ which, ms }) => <path key={which} className="data" d={`M${x(ms)} 14V${foot}`} />)}
      </svg>
      {valid &&
        handles.map(({ which, ms, name }) => (
          <div
            key={which}
            className={styles.handle}
            style={{ left: x(ms), top: foot / 2 }}
            role="slider"
            tabIndex={0}
            aria-label={name}
            aria-valuemin={windowStartMs}
            aria-valuemax={lastMs}
            aria-valuenow={ms}
            aria-valuetext={`${formatNumber(ms, 0)} ms`}
            onKeyDown={onKeyDown(which, ms)}
            onPointerDown={(event) => {
              drag.current = which;
              event.currentTarget.setPointerCapture(event.pointerId);
            }}
            onPointerMove={(event) => drag.current === which && set(which, msAt(event))}
            onPointerUp={() => (drag.current = null)}
            onPointerCancel={() => (drag.current = null)}
          >
            <svg width="10" height="20" aria-hidden="true">
              <rect
                x="0.9"
                y="0.9"
                width="8.2"
                height="18.2"
                rx="2"
                style={{ fill: 'var(--paper)', stroke: 'var(--verdigris)', strokeWidth: 1.8 }}
              />
              <path d="M3.5 6v8m3 -8v8" style={{ stroke: 'var(--verdigris)' }} />
            </svg>
          </div>
        ))}
    </div>
  );
}
