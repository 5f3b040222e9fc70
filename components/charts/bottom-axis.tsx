import { chartNumber } from '@/components/charts/chart-number';
import type { LinearScale } from '@/components/charts/linear-scale';

/** Range-frame axis at the foot of a drawing: only as long as its ticks, ticks outward, title with unit below. */
export function BottomAxis({
  scale,
  y,
  ticks,
  decimals,
  title,
  text = (value) => chartNumber(value, decimals),
}: {
  scale: LinearScale;
  y: number;
  ticks: readonly number[];
  decimals: number;
  title?: string;
  text?: (value: number) => string;
}) {
  if (ticks.length === 0) return null;
  const a = scale(ticks[0]);
  const b = scale(ticks[ticks.length - 1]);
  return (
    <g>
      <path className="ax" d={`M${a} ${y}H${b}${ticks.map((t) => `M${scale(t)} ${y}v4`).join('')}`} />
      {ticks.map((t) => (
        <text key={t} x={scale(t)} y={y + 16} textAnchor="middle">
          {text(t)}
        </text>
      ))}
      {title && (
        <text className="ttl" x={(a + b) / 2} y={y + 33} textAnchor="middle">
          {title}
        </text>
      )}
    </g>
  );
}
