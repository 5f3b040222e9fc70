import type { StripData } from '@/components/fold-strip/strip-data';

export type StripLane = 'fold' | 'label' | 'column' | 'excluded' | 'residual';

/** Pixels of a fold strip. The scale (px a trial) is the same for every session, so that lengths compare. */
export interface StripLayout {
  pxPerTrial: number;
  left: number;
  width: number;
  height: number;
  top: number;
  bottom: number;
  lanes: { lane: StripLane; y: number; height: number }[];
}

const pxPerTrial = 1.6;
const left = 84;
const laneHeights: Record<StripLane, number> = {
  fold: 38,
  label: 34,
  column: 30,
  excluded: 14,
  residual: 44,
};

/** Which lanes the data fills, and where they lie. */
export function stripLayout(data: StripData): StripLayout {
  const present: Record<StripLane, boolean> = {
    fold: data.folds !== null,
    label: data.label !== null,
    column: data.column !== null,
    excluded: true,
    residual: data.predicted !== null && data.label !== null,
  };
  const top = 22;
  let y = top;
  const lanes: StripLayout['lanes'] = [];
  for (const lane of ['fold', 'label', 'column', 'excluded', 'residual'] as const) {
    if (!present[lane]) continue;
    // Many folds need room: three px a fold keeps the stair readable.
    const height =
      lane === 'fold' ? Math.max(38, Math.min(90, 3 * (data.folds?.nFolds ?? 0))) : laneHeights[lane];
    lanes.push({ lane, y, height });
    y += height + 6;
  }
  const bottom = y - 2;
  return {
    pxPerTrial,
    left,
    width: Math.ceil(left + data.nTrials * pxPerTrial + 2),
    height: bottom + 20,
    top,
    bottom,
    lanes,
  };
}
