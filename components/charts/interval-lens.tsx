import { chartNumber } from '@/components/charts/chart-number';
import type { IntervalAxisRange } from '@/components/charts/interval-glyph';
import { linearScale } from '@/components/charts/linear-scale';

/**
 * A lens for an estimate over replications: open for one animal's sessions; filled with a bracket (where a new
 * animal is expected) over animals.
 */
export function IntervalLens({
  value,
  interval,
  predictionInterval,
  axis,
  width = 250,
  height = 44,
  groupMean,
}: {
  value: number;
  interval: { low: number; high: number };
  predictionInterval?: { low: number; high: number } | null;
  axis: IntervalAxisRange;
  width?: number;
  height?: number;
  groupMean?: number | null;
}) {
  const scale = linearScale(axis.low, axis.high, 0, width);
  const at = (v: number): number => scale(Math.max(axis.low, Math.min(axis.high, v)));
  const filled = predictionInterval != null;
  const y = height / 2 - (filled ? 4 : 0);
  const r = filled ? 7 : 5;
  const [a, b, x] = [at(interval.low), at(interval.high), at(value)];
  const said = `${chartNumber(value)}, 95 % interval ${chartNumber(interval.low)} to ${chartNumber(interval.high)}${
    predictionInterval
      ? `, a new animal is expected from ${chartNumber(predictionInterval.low)} to ${chartNumber(predictionInterval.high)}`
      : ''
  }`;
  return (
    <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} role="img" aria-label={said}>
      <path className="zero" d={`M${scale(0)} -1V${height + 1}`} />
      {groupMean != null && <path className="gm" d={`M${scale(groupMean)} -1V${height + 1}`} />}
      <path
        className="fink"
        style={filled ? undefined : { fill: 'var(--paper)', stroke: 'var(--ink)', strokeWidth: 1.2 }}
        d={`M${a} ${y}Q${x} ${y - 2 * r} ${b} ${y}Q${x} ${y + 2 * r} ${a} ${y}Z`}
      />
      <path
        d={`M${x} ${y - r + 1}v${2 * r - 2}`}
        style={{ stroke: `var(${filled ? '--paper' : '--ink'})`, strokeWidth: 1.5 }}
      />
      {interval.low < axis.low && <path className="inkl" d={`M6 ${y - 4}L1 ${y}L6 ${y + 4}`} />}
      {interval.high > axis.high && (
        <path className="inkl" d={`M${width - 6} ${y - 4}L${width - 1} ${y}L${width - 6} ${y + 4}`} />
      )}
      {predictionInterval && (
        <path
          className="inkl"
          style={{ strokeWidth: 1.2 }}
          d={`M${at(predictionInterval.low)} ${y + 10}v6H${at(predictionInterval.high)}v-6`}
        />
      )}
    </svg>
  );
}
