/** The bins of a window, `binFrom` to `binTo` − 1, or which of its edges is not the edge of a bin. */
export type Bins = { binFrom: number; binTo: number } | { fault: 'startMs' | 'endMs'; message: string };

interface BinGrid {
  windowStartMs: number;
  binWidthMs: number;
  nBins: number;
}

/** A window's bins. An edge that is no bin edge is a fault and never rounded; the slack is for the arithmetic alone. */
export function findBins(grid: BinGrid, window: { startMs: number; endMs: number }): Bins {
  const { windowStartMs, binWidthMs, nBins } = grid;
  const endOfBins = windowStartMs + nBins * binWidthMs;
  const at = (ms: number) => (ms - windowStartMs) / binWidthMs;
  for (const side of ['startMs', 'endMs'] as const) {
    const ms = window[side];
    const bin = at(ms);
    const nearest = Math.round(bin);
    if (Math.abs(bin - nearest) > 1e-6)
      return {
        fault: side,
        message: `${ms} ms is not a bin edge: bins are ${binWidthMs} ms wide and start at ${windowStartMs} ms, so the nearest edges are ${windowStartMs + Math.floor(bin) * binWidthMs} and ${windowStartMs + Math.ceil(bin) * binWidthMs} ms.`,
      };
    if (nearest < 0 || nearest > nBins)
      return {
        fault: side,
        message: `${ms} ms lies outside the recording, which runs from ${windowStartMs} to ${endOfBins} ms.`,
      };
  }
  const binFrom = Math.round(at(window.startMs));
  const binTo = Math.round(at(window.endMs));
  if (binTo <= binFrom) return { fault: 'endMs', message: 'The window ends before it starts.' };
  return { binFrom, binTo };
}
