'use client';

import { useWidth } from '@/components/charts/use-width';
import { formatValue } from '@/lib/format/format-value';

const leftPx = 60;
const topPx = 18;
const rowPx = 7;

/** About six round times along the window, at bin edges. */
function timeTicks(nBins: number, binWidthMs: number, windowStartMs: number): { bin: number; ms: number }[] {
  const every = Math.max(1, Math.ceil(nBins / 6));
  const ticks = [];
  for (let bin = 0; bin <= nBins; bin += every) ticks.push({ bin, ms: windowStartMs + bin * binWidthMs });
  return ticks;
}

/** One trial's counts, units × bins, as darkness from none to the largest; the alignment event is a line where it lies in the window. */
export function CountsRaster({
  counts,
  binWidthMs,
  windowStartMs,
}: {
  counts: readonly (readonly number[])[];
  binWidthMs: number;
  windowStartMs: number;
}) {
  const [ref, width] = useWidth<HTMLDivElement>(620);
  const nUnits = counts.length;
  const nBins = counts[0]?.length ?? 0;
  const widthPx = Math.min(width, 700);
  const binPx = (widthPx - leftPx - 14) / Math.max(1, nBins);
  const bottom = topPx + nUnits * rowPx;
  const most = Math.max(1, ...counts.map((row) => Math.max(0, ...row)));
  const steps = [0.25, 0.5, 0.75, 1];
  const paths = steps.map((_, step) =>
    counts
      .flatMap((row, unit) =>
        row.map((count, bin) =>
          count > 0 && Math.min(3, Math.ceil((count / most) * 4) - 1) === step
            ? `M${(leftPx + bin * binPx).toFixed(1)} ${topPx + unit * rowPx}h${Math.max(1, binPx - 0.4).toFixed(1)}v${rowPx - 1}h-${Math.max(1, binPx - 0.4).toFixed(1)}z`
            : '',
        ),
      )
      .join(''),
  );
  const eventBin = -windowStartMs / binWidthMs;
  const showsEvent = eventBin >= 0 && eventBin <= nBins;
  const eventX = leftPx + eventBin * binPx;
  return (
    <div ref={ref}>
      <svg
        width={widthPx}
        height={bottom + 38}
        viewBox={`0 0 ${widthPx} ${bottom + 38}`}
        role="img"
        aria-label={`Spike counts of trial 1, ${nUnits} units by ${nBins} bins`}
      >
        {paths.map((d, step) =>
          d ? <path key={steps[step]} d={d} fill="var(--ink)" opacity={steps[step]} /> : null,
        )}
        {showsEvent ? (
          <>
            <path className="data" strokeWidth="1.4" d={`M${eventX.toFixed(1)} 12V${bottom + 2}`} />
            <text className="lab v" x={eventX} y="9" textAnchor={eventBin < nBins / 8 ? 'start' : 'middle'}>
              alignment event
            </text>
          </>
        ) : null}
        <text className="lab" x="0" y={topPx + 7}>
          unit
        </text>
        <text x={leftPx - 10} y={topPx + 7} textAnchor="end">
          1
        </text>
        {nUnits > 1 ? (
          <text x={leftPx - 10} y={bottom} textAnchor="end">
            {nUnits}
          </text>
        ) : null}
        {timeTicks(nBins, binWidthMs, windowStartMs).map(({ bin, ms }) => (
          <text key={bin} x={leftPx + bin * binPx} y={bottom + 16} textAnchor="middle">
            {formatValue(ms)}
          </text>
        ))}
        <text className="ttl" x={leftPx + (nBins * binPx) / 2} y={bottom + 34} textAnchor="middle">
          ms from the alignment event
        </text>
      </svg>
    </div>
  );
}
