import { chartNumber } from '@/components/charts/chart-number';
import type { IntervalAxisRange } from '@/components/charts/interval-glyph';
import { linearScale } from '@/components/charts/linear-scale';

/** Head of a column of interval glyphs: the one axis that its rows share. */
export function IntervalAxis({
  axis,
  width = 250,
  height = 34,
  title = 'R², held-out',
}: {
  axis: IntervalAxisRange;
  width?: number;
  height?: number;
  title?: string;
}) {
  const scale = linearScale(axis.low, axis.high, 0, width);
  const last = axis.ticks.length - 1;
  return (
    <svg
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label={`axis, ${title}`}
    >
      <text x="0" y="11" className="ttl">
        {title}
      </text>
      {axis.ticks.map((tick, index) => (
        <g key={tick}>
          <text
            x={scale(tick)}
            y={height - 9}
            textAnchor={index === 0 ? 'start' : index === last ? 'end' : 'middle'}
          >
            {tick === 0 ? '0' : chartNumber(tick, 1)}
          </text>
          <path className="ax" d={`M${scale(tick)} ${height - 5}V${height}`} />
        </g>
      ))}
    </svg>
  );
}
