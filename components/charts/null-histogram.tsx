'use client';
import { useMemo, useState } from 'react';
import { axisTicks } from '@/components/charts/axis-ticks';
import { BottomAxis } from '@/components/charts/bottom-axis';
import { chartNumber } from '@/components/charts/chart-number';
import styles from '@/components/charts/figure.module.css';
import { histogramBins } from '@/components/charts/histogram-bins';
import { linearScale } from '@/components/charts/linear-scale';
import { PlotCursor } from '@/components/charts/plot-cursor';
import { useWidth } from '@/components/charts/use-width';

/**
 * The shuffles' held-out R² as hatched madder bars with the observed value and its interval above them. The keyboard
 * walks the bars.
 */
export function NullHistogram({
  values,
  scheme,
  observed,
  interval,
  q95,
  largest,
  height = 250,
}: {
  values: readonly number[];
  /** How labels were shuffled, in words: "within block". */
  scheme: string;
  observed: number | null;
  interval: { low: number; high: number } | null;
  q95: number | null;
  largest: number | null;
  height?: number;
}) {
  const [holder, width] = useWidth<HTMLDivElement>(508);
  const [at, setAt] = useState(-1);
  const bins = useMemo(() => histogramBins(values), [values]);
  const bottom = height - 40;
  const low = Math.min(bins[0]?.from ?? 0, interval?.low ?? 0, observed ?? 0);
  const high = Math.max(bins[bins.length - 1]?.to ?? 0, interval?.high ?? 0, observed ?? 0);
  const ticks = axisTicks(low, high, width < 400 ? 4 : 7);
  const x = linearScale(ticks.values[0], ticks.values[ticks.values.length - 1], 16, width - 16);
  const y = linearScale(0, Math.max(1, ...bins.map((bin) => bin.count)), bottom - 1, 96);
  const spokenBin = bins[at];
  const spoken = spokenBin
    ? `R² from ${chartNumber(spokenBin.from, 3)} to ${chartNumber(spokenBin.to, 3)}: ${spokenBin.count} of ${values.length} shuffles`
    : '';
  // The words stand on the side of the null that the observed value leaves free.
  const nullMiddle = x(((bins[0]?.from ?? 0) + (bins[bins.length - 1]?.to ?? 0)) / 2);
  const wordsLeft = nullMiddle > width / 2;
  const wordsX = wordsLeft ? x(bins[0]?.from ?? 0) - 8 : x(bins[bins.length - 1]?.to ?? 0) + 8;
  const anchor = wordsLeft ? 'end' : 'start';
  const observedText =
    observed === null
      ? ''
      : `${chartNumber(observed)}${interval ? ` [${chartNumber(interval.low)}, ${chartNumber(interval.high)}]` : ''}`;
  const observedX = observed === null ? 0 : Math.max(70, Math.min(width - 70, x(observed)));
  const onPointer = (clientX: number, _clientY: number, box: DOMRect): void => {
    const value = x.invert(clientX - box.left);
    const found = bins.findIndex((bin) => value >= bin.from && value < bin.to);
    if (found >= 0) setAt(found);
  };
  return (
    <div ref={holder}>
      <PlotCursor
        name={`${values.length} label shuffles and the observed R²`}
        place={at}
        count={bins.length}
        spoken={spoken}
        onMove={setAt}
        onPointer={onPointer}
      >
        <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
          <BottomAxis
            scale={x}
            y={bottom}
            ticks={ticks.values}
            decimals={ticks.decimals}
            title="R², held-out"
          />
          {bins.map((bin) =>
            bin.count === 0 ? null : (
              <g key={bin.from}>
                <rect
                  className="hnul"
                  x={x(bin.from)}
                  y={y(bin.count)}
                  width={Math.max(0.5, x(bin.to) - x(bin.from) - 0.3)}
                  height={bottom - 1 - y(bin.count)}
                />
                <path className="nul" d={`M${x(bin.from)} ${y(bin.count)}H${x(bin.to)}`} />
              </g>
            ),
          )}
          {spokenBin && (
            <path
              data-screen-only=""
              d={`M${(x(spokenBin.from) + x(spokenBin.to)) / 2} 90V${bottom}`}
              style={{ stroke: 'var(--focus-ink)', strokeWidth: 1.4 }}
            />
          )}
          <path className="zero" d={`M${x(0)} 76V${bottom}`} />
          <text className="lab m" x={wordsX} y={112} textAnchor={anchor}>
            {`${chartNumber(values.length, 0)} shuffles ${scheme}`}
          </text>
          {q95 !== null && (
            <text x={wordsX} y={128} textAnchor={anchor}>{`95 % below ${chartNumber(q95, 3)}`}</text>
          )}
          {largest !== null && (
            <text x={wordsX} y={143} textAnchor={anchor}>{`largest ${chartNumber(largest, 3)}`}</text>
          )}
          {observed !== null && (
            <g>
              <path className="data" d={`M${x(observed)} ${bottom - 1}V58`} />
              {interval && <path className="data" d={`M${x(interval.low)} 58H${x(interval.high)}`} />}
              <circle cx={x(observed)} cy="58" r="5" className="fdata" />
              <text className="lab v" x={observedX} y="26" textAnchor="middle">
                observed
              </text>
              <text className="strong" x={observedX} y="43" textAnchor="middle">
                {observedText}
              </text>
            </g>
          )}
        </svg>
      </PlotCursor>
      <p className={styles.spoken} aria-hidden="true">
        {spoken && <span className="n">{spoken}</span>}
      </p>
    </div>
  );
}
