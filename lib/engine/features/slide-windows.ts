import type { TimeWindow } from '@/lib/engine/readout/types';

/**
 * The windows of `widthMs` that begin every `stepMs` from the first recorded bin on and end within the recording.
 * Width and step must be whole numbers of bins (to 1e-6 of a bin); null where they are not, or none fits.
 */
export function slideWindows(
  widthMs: number,
  stepMs: number,
  windowStartMs: number,
  binWidthMs: number,
  nBins: number,
): TimeWindow[] | null {
  const width = Math.round(widthMs / binWidthMs);
  const step = Math.round(stepMs / binWidthMs);
  const isWhole = (ms: number, bins: number): boolean => bins >= 1 && Math.abs(ms / binWidthMs - bins) < 1e-6;
  if (!isWhole(widthMs, width) || !isWhole(stepMs, step) || width > nBins) return null;
  const windows: TimeWindow[] = [];
  for (let bin = 0; bin + width <= nBins; bin += step) {
    const startMs = windowStartMs + bin * binWidthMs;
    windows.push({ startMs, endMs: startMs + width * binWidthMs });
  }
  return windows;
}
