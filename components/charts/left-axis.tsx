import { chartNumber } from '@/components/charts/chart-number';
import type { LinearScale } from '@/components/charts/linear-scale';

/** Range-frame axis at the left of a drawing; its title stands above its upper end, never turned. */
export function LeftAxis({
  scale,
  x,
  ticks,
  decimals,
  title,
  titleY = 10,
  titleX = 0,
  text = (value) => chartNumber(value, decimals),
}: {
  scale: LinearScale;
  x: number;
  ticks: readonly number[];
  decimals: number;
  title?: string;
  titleY?: number;
  titleX?: number;
  text?: (value: number) => string;
}) {
  if (ticks.length === 0) return null;
  const a = scale(ticks[0]);
  const b = scale(ticks[ticks.length - 1]);
  return (
    <g>
      <path className="ax" d={`M${x} ${a}V${b}${ticks.map((t) => `M${x - 4} ${scale(t)}h4`).join('')}`} />
      {ticks.map((t) => (
        <text key={t} x={x - 7} y={scale(t) + 3.8} textAnchor="end">
          {text(t)}
        </text>
      ))}
      {title && (
        <text className="ttl" x={titleX} y={titleY}>
          {title}
        </text>
      )}
    </g>
  );
}
