import type { AxisTicks } from '@/components/charts/axis-ticks';

/** Ticks at the levels of a label, with as many decimals as tell them apart (at most four). */
export function levelTicks(levels: readonly number[]): AxisTicks {
  let decimals = 0;
  while (decimals < 4 && levels.some((level) => Math.abs(Number(level.toFixed(decimals)) - level) > 1e-9))
    decimals += 1;
  const steps = levels.slice(1).map((level, index) => level - levels[index]);
  return { values: [...levels], decimals, step: Math.min(...steps, 1) };
}
