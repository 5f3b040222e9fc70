'use client';
import { useState } from 'react';
import { axisTicks } from '@/components/charts/axis-ticks';
import { BottomAxis } from '@/components/charts/bottom-axis';
import { chartNumber } from '@/components/charts/chart-number';
import styles from '@/components/charts/figure.module.css';
import { linearScale } from '@/components/charts/linear-scale';
import { PlotCursor } from '@/components/charts/plot-cursor';
import { useWidth } from '@/components/charts/use-width';

/** A named value with its spread; open where it is not told from chance. */
export interface UnitDot {
  name: string;
  value: number;
  spread: number | null;
  isFilled: boolean;
}

const rowPx = 15;

/** One row a unit, one panel a quantity, all with a zero line: dots with ± spread. All panels have the same rows. */
export function UnitDots({
  panels,
  name,
}: {
  panels: readonly { title: string; rows: readonly UnitDot[] }[];
  name: string;
}) {
  const [holder, width] = useWidth<HTMLDivElement>(640);
  const [at, setAt] = useState(-1);
  const rows = panels[0]?.rows ?? [];
  const left = 46;
  const gap = 36;
  const panelWidth = (width - left - gap * (panels.length - 1) - 8) / Math.max(1, panels.length);
  const foot = 30 + rows.length * rowPx;
  const spoken = rows[at]
    ? `unit ${rows[at].name}: ${panels.map((panel) => `${panel.title.split(',')[0]} ${chartNumber(panel.rows[at].value, 4, true)}`).join(', ')}`
    : '';
  return (
    <div ref={holder}>
      <PlotCursor
        name={name}
        place={at}
        count={rows.length}
        spoken={spoken}
        onMove={setAt}
        onKey={(event) => {
          // Rows run downwards here: Down is the next one.
          if (event.key !== 'ArrowDown' && event.key !== 'ArrowUp') return false;
          setAt((now) => Math.max(0, Math.min(rows.length - 1, now + (event.key === 'ArrowDown' ? 1 : -1))));
          return true;
        }}
        onPointer={(_x, clientY, box) => {
          const row = Math.floor((clientY - box.top - 22) / rowPx);
          if (row >= 0 && row < rows.length) setAt(row);
        }}
      >
        <svg width={width} height={foot + 26} viewBox={`0 0 ${width} ${foot + 26}`} aria-hidden="true">
          <text className="ttl" x="0" y="12">
            unit
          </text>
          {rows.map((row, index) => (
            <g key={row.name}>
              {index % 2 === 1 && (
                <rect
                  className="fsunk"
                  style={{ opacity: 0.65 }}
                  x="0"
                  y={22 + index * rowPx}
                  width={width}
                  height={rowPx}
                />
              )}
              <text className="strong" x="28" y={22 + index * rowPx + 11} textAnchor="end">
                {row.name}
              </text>
            </g>
          ))}
          {panels.map((panel, p) => {
            const a = left + p * (panelWidth + gap);
            const ends = panel.rows.flatMap((row) => [
              row.value - (row.spread ?? 0),
              row.value + (row.spread ?? 0),
            ]);
            const ticks = axisTicks(
              Math.min(0, ...ends),
              Math.max(0, ...ends),
              Math.max(2, Math.floor(panelWidth / 90)),
            );
            const x = linearScale(ticks.values[0], ticks.values[ticks.values.length - 1], a, a + panelWidth);
            return (
              <g key={panel.title}>
                <text className="ttl" x={a + panelWidth / 2} y="12" textAnchor="middle">
                  {panelWidth < 180 ? panel.title.split(',')[0] : panel.title}
                </text>
                <path className="zero" d={`M${x(0)} 20V${foot - 6}`} />
                {panel.rows.map((row, index) => {
                  const y = 22 + index * rowPx + rowPx / 2;
                  return (
                    <g key={row.name}>
                      {row.spread !== null && (
                        <path
                          className="data"
                          style={{ strokeWidth: 1.4 }}
                          d={`M${x(row.value - row.spread)} ${y}H${x(row.value + row.spread)}`}
                        />
                      )}
                      <circle cx={x(row.value)} cy={y} r="4" className={row.isFilled ? 'fdata' : 'hdata'} />
                    </g>
                  );
                })}
                <BottomAxis scale={x} y={foot} ticks={ticks.values} decimals={ticks.decimals} />
              </g>
            );
          })}
          {rows[at] && (
            <rect
              data-screen-only=""
              x="0.5"
              y={22 + at * rowPx}
              width={width - 1}
              height={rowPx}
              style={{ fill: 'none', stroke: 'var(--focus-ink)', strokeWidth: 1.4 }}
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
