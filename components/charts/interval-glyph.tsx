import { chartNumber } from '@/components/charts/chart-number';
import { linearScale } from '@/components/charts/linear-scale';

/** What the controls and the null left of an estimate; decides the mark, never colour alone. */
export type IntervalMark = 'carried' | 'open' | 'explained' | 'nuisanceOnly' | 'worse';

/** The axis that all rows of a table share. */
export interface IntervalAxisRange {
  low: number;
  high: number;
  ticks: readonly number[];
}

export interface IntervalGlyphProps {
  value: number | null;
  interval: { low: number; high: number } | null;
  /** Middle 95 % of the shuffles. */
  nullInterval?: { low: number; high: number } | null;
  mark: IntervalMark;
  planned?: boolean;
  axis: IntervalAxisRange;
  width?: number;
  height?: number;
  groupMean?: number | null;
  /** Said in place of the number where there is no result. */
  emptyText?: string;
}

function Mark({ mark, x, y }: { mark: IntervalMark; x: number; y: number }) {
  if (mark === 'carried') return <circle cx={x} cy={y} r="4.6" className="fdata" />;
  if (mark === 'open')
    return (
      <circle cx={x} cy={y} r="4.2" className="fpaper" style={{ stroke: 'var(--ink)', strokeWidth: 1.5 }} />
    );
  if (mark === 'nuisanceOnly') return <rect x={x - 4} y={y - 4} width="8" height="8" className="fnui" />;
  if (mark === 'explained')
    return (
      <>
        <circle
          cx={x}
          cy={y}
          r="4.4"
          className="fpaper"
          style={{ stroke: 'var(--ochre)', strokeWidth: 1.6 }}
        />
        <path className="fnui" d={`M${x} ${y - 4.4}a4.4 4.4 0 0 0 0 8.8z`} />
      </>
    );
  return <path className="fink" d={`M${x - 5.5} ${y}l8.5 -5v10z`} />;
}

/**
 * Estimate, 95 % interval and null in three layers that never cover each other: bar (solid planned, broken
 * exploratory), mark, hatched shelf below. What runs off the common axis ends in an arrowhead; nothing is clipped
 * silently.
 */
export function IntervalGlyph(props: IntervalGlyphProps) {
  const { value, interval, nullInterval, mark, planned = false, axis, width = 250, height = 30 } = props;
  const scale = linearScale(axis.low, axis.high, 0, width);
  const inside = (v: number): number => Math.max(axis.low, Math.min(axis.high, v));
  const y = nullInterval ? height / 2 - 3 : height / 2;
  const ink = mark === 'worse' || mark === 'open' ? 'inkl' : mark === 'carried' ? 'data' : 'nui';
  const said =
    value === null
      ? (props.emptyText ?? 'no result')
      : `${chartNumber(value)}${interval ? `, 95 % interval ${chartNumber(interval.low)} to ${chartNumber(interval.high)}` : ''}${value < axis.low || value > axis.high ? ', off the axis' : ''}`;
  const zeroX = Math.round(scale(0) * 10) / 10;
  const shelf =
    nullInterval && nullInterval.high > axis.low && nullInterval.low < axis.high
      ? { a: scale(inside(nullInterval.low)), b: scale(inside(nullInterval.high)) }
      : null;
  return (
    <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} role="img" aria-label={said}>
      <path className="zero" d={`M${zeroX} -1V${height + 1}`} />
      {props.groupMean != null && <path className="gm" d={`M${scale(props.groupMean)} -1V${height + 1}`} />}
      {shelf && (
        <rect
          x={shelf.a}
          y={height / 2 + 5}
          width={Math.max(3, shelf.b - shelf.a)}
          height="5"
          className="hnul"
        />
      )}
      {interval && value !== null && value >= axis.low && value <= axis.high && (
        <>
          <path
            className={ink}
            style={{ strokeWidth: 2, strokeDasharray: planned ? undefined : '4 2.5' }}
            d={`M${scale(inside(interval.low))} ${y}H${scale(inside(interval.high))}`}
          />
          {interval.low < axis.low && (
            <path className={ink} style={{ strokeWidth: 1.5 }} d={`M6 ${y - 4}L1 ${y}L6 ${y + 4}`} />
          )}
          {interval.high > axis.high && (
            <path
              className={ink}
              style={{ strokeWidth: 1.5 }}
              d={`M${width - 6} ${y - 4}L${width - 1} ${y}L${width - 6} ${y + 4}`}
            />
          )}
        </>
      )}
      {value !== null && value < axis.low && (
        <>
          <path className={ink} style={{ strokeWidth: 1.5 }} d={`M6 ${y - 4}L1 ${y}L6 ${y + 4}`} />
          <text x="14" y={y + 4} className="strong">
            {chartNumber(value)}
          </text>
        </>
      )}
      {value !== null && value > axis.high && (
        <>
          <path
            className={ink}
            style={{ strokeWidth: 1.5 }}
            d={`M${width - 6} ${y - 4}L${width - 1} ${y}L${width - 6} ${y + 4}`}
          />
          <text x={width - 14} y={y + 4} textAnchor="end" className="strong">
            {chartNumber(value)}
          </text>
        </>
      )}
      {value !== null && value >= axis.low && value <= axis.high && (
        <Mark mark={mark} x={scale(value)} y={y} />
      )}
    </svg>
  );
}
