'use client';
import { useMemo, useState } from 'react';
import { axisTicks } from '@/components/charts/axis-ticks';
import { chartNumber } from '@/components/charts/chart-number';
import styles from '@/components/charts/figure.module.css';
import { linearScale } from '@/components/charts/linear-scale';
import { PlotCursor } from '@/components/charts/plot-cursor';
import { useWidth } from '@/components/charts/use-width';

/** Map of R² fitted in one window and tested in another: paper to verdigris in eight steps, hatched below zero. */
export function GeneralisationMap({
  centresMs,
  r2,
}: {
  centresMs: readonly number[];
  r2: readonly (readonly (number | null)[])[];
}) {
  const [holder, measured] = useWidth<HTMLDivElement>(400);
  const [at, setAt] = useState(-1);
  const n = centresMs.length;
  const width = Math.min(measured, 440);
  const left = 52;
  const top = 22;
  const cell = (width - left - 10) / Math.max(1, n);
  const side = cell * n;
  const largest = useMemo(
    () => r2.flat().reduce<number>((most, value) => Math.max(most, value ?? 0), 0),
    [r2],
  );
  const floor = -0.02 * Math.max(largest, 0.05);
  const stepOf = (value: number): number =>
    largest <= 0 ? 0 : Math.max(0, Math.min(7, Math.floor((value / largest) * 8)));
  const drawn = useMemo(() => {
    const fills = Array.from({ length: 8 }, () => '');
    let below = '';
    for (let i = 0; i < n; i += 1)
      for (let j = 0; j < n; j += 1) {
        const value = r2[i]?.[j] ?? null;
        if (value === null) continue;
        const x = (left + j * cell).toFixed(1);
        const y = (top + (n - 1 - i) * cell).toFixed(1);
        const size = (cell + 0.3).toFixed(2);
        const square = `M${x} ${y}h${size}v${size}h-${size}z`;
        if (value < floor) below += square;
        else fills[stepOf(value)] += square;
      }
    return { fills, below };
    // stepOf follows from largest.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [r2, n, cell, floor, largest]);
  const x = linearScale(centresMs[0] ?? 0, centresMs[n - 1] ?? 1, left + cell / 2, left + side - cell / 2);
  const y = linearScale(centresMs[0] ?? 0, centresMs[n - 1] ?? 1, top + side - cell / 2, top + cell / 2);
  const ticks = axisTicks(centresMs[0] ?? 0, centresMs[n - 1] ?? 1, 5, true);
  const [i, j] = at < 0 ? [-1, -1] : [Math.floor(at / n), at % n];
  const value = at < 0 ? null : (r2[i]?.[j] ?? null);
  const spoken =
    at < 0
      ? ''
      : `fitted at ${chartNumber(centresMs[i], 0)} ms, tested at ${chartNumber(centresMs[j], 0)} ms: R² ${value === null ? 'not known' : chartNumber(value, 3)}`;
  const foot = top + side;
  return (
    <div ref={holder}>
      <PlotCursor
        name="Temporal generalisation"
        place={at}
        count={n * n}
        spoken={spoken}
        leap={n}
        onMove={setAt}
        onKey={(event) => {
          // Up and down walk the fitted window, so that both axes are reached.
          if (at < 0 || (event.key !== 'ArrowUp' && event.key !== 'ArrowDown')) return false;
          const next = at + (event.key === 'ArrowUp' ? n : -n);
          if (next >= 0 && next < n * n) setAt(next);
          return true;
        }}
        onPointer={(clientX, clientY, box) => {
          const column = Math.floor((clientX - box.left - left) / cell);
          const row = n - 1 - Math.floor((clientY - box.top - top) / cell);
          if (column >= 0 && column < n && row >= 0 && row < n) setAt(row * n + column);
        }}
      >
        <svg width={width} height={foot + 76} viewBox={`0 0 ${width} ${foot + 76}`} aria-hidden="true">
          <text className="ttl" x="0" y="11">
            fitted in window centred at, ms
          </text>
          {drawn.fills.map((d, step) =>
            d ? <path key={step} d={d} style={{ fill: `var(--m${step})` }} /> : null,
          )}
          {drawn.below && <path d={drawn.below} style={{ fill: 'url(#hg)', opacity: 0.5 }} />}
          <rect x={left} y={top} width={side} height={side} style={{ fill: 'none', stroke: 'var(--edge)' }} />
          <path className="ref" d={`M${left} ${foot}L${left + side} ${top}`} />
          {ticks.values.map((tick) => (
            <g key={tick}>
              <text x={x(tick)} y={foot + 15} textAnchor="middle">
                {chartNumber(tick, 0)}
              </text>
              <text x={left - 6} y={y(tick) + 4} textAnchor="end">
                {chartNumber(tick, 0)}
              </text>
            </g>
          ))}
          <text className="ttl" x={left + side / 2} y={foot + 32} textAnchor="middle">
            tested in window centred at, ms
          </text>
          {Array.from({ length: 8 }, (_, step) => (
            <g key={step}>
              <rect
                x={left + step * 34}
                y={foot + 44}
                width="34"
                height="8"
                style={{ fill: `var(--m${step})`, stroke: 'var(--edge)', strokeWidth: 0.5 }}
              />
              {step % 2 === 0 && (
                <text x={left + step * 34} y={foot + 66}>
                  {chartNumber((step * largest) / 8, 2)}
                </text>
              )}
            </g>
          ))}
          {at >= 0 && (
            <rect
              data-screen-only=""
              x={left + j * cell}
              y={top + (n - 1 - i) * cell}
              width={cell}
              height={cell}
              style={{ fill: 'none', stroke: 'var(--focus-ink)', strokeWidth: 2 }}
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
