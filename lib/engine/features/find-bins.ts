import type { TimeWindow } from '@/lib/engine/readout/types';

/** Half-open range of bins, or why there is none. */
export type BinRange =
  { ok: true; from: number; to: number } | { ok: false; message: string; remedy: string };

/**
 * The bins that a window [startMs, endMs) covers. An edge must lie on a bin edge (to 1e-6 of a bin, for times that were
 * typed in decimals); it is never rounded. Bins are half-open, bin b starts at windowStartMs + b·binWidthMs.
 */
export function findBins(
  window: TimeWindow,
  windowStartMs: number,
  binWidthMs: number,
  nBins: number,
): BinRange {
  const endOfData = windowStartMs + nBins * binWidthMs;
  const span = `[${window.startMs}, ${window.endMs}) ms`;
  const remedy = `Use edges from ${windowStartMs} to ${endOfData} ms in steps of ${binWidthMs} ms.`;
  if (!(window.startMs < window.endMs)) {
    return { ok: false, message: `The window ${span} is empty: its end must come after its start.`, remedy };
  }
  const edges = [window.startMs, window.endMs].map((ms) => (ms - windowStartMs) / binWidthMs);
  const [from, to] = edges.map(Math.round);
  for (const [i, name] of ['start', 'end'].entries()) {
    if (Math.abs(edges[i] - [from, to][i]) > 1e-6) {
      const ms = i === 0 ? window.startMs : window.endMs;
      return {
        ok: false,
        message: `The window's ${name} (${ms} ms) is not a bin edge; bins of ${binWidthMs} ms begin at ${windowStartMs} ms.`,
        remedy,
      };
    }
  }
  if (from < 0 || to > nBins) {
    return {
      ok: false,
      message: `The window ${span} reaches outside the recorded bins [${windowStartMs}, ${endOfData}) ms.`,
      remedy,
    };
  }
  return { ok: true, from, to };
}
