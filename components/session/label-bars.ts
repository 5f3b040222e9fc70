import { histogramBins } from '@/components/charts/histogram-bins';

/** One bar: a level of the label or a stretch of it. */
export interface LabelBar {
  from: number;
  to: number;
  count: number;
}

/** Bars of a label: one a level where it has at most 12, else bins of a round width. */
export function labelBars(values: readonly number[]): { bars: LabelBar[]; isLevels: boolean } {
  const counts = new Map<number, number>();
  for (const value of values) counts.set(value, (counts.get(value) ?? 0) + 1);
  if (counts.size > 12) return { bars: histogramBins(values), isLevels: false };
  const bars = [...counts]
    .map(([level, count]) => ({ from: level, to: level, count }))
    .sort((a, b) => a.from - b.from);
  return { bars, isLevels: true };
}
