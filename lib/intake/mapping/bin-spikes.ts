/**
 * Counts one unit's spikes in half-open bins [edge_k, edge_k+1) of each trial, edge_k = event + (start + k·width), all in
 * seconds and in double precision. `times` must be sorted. `put` is called for bins that are not empty. Trials may overlap.
 */
export function binSpikes(
  times: Float64Array,
  events: Float64Array,
  bins: { startSeconds: number; widthSeconds: number; nBins: number },
  put: (trial: number, bin: number, count: number) => void,
): void {
  const { startSeconds, widthSeconds, nBins } = bins;
  for (let trial = 0; trial < events.length; trial++) {
    const edge = (k: number): number => events[trial] + (startSeconds + k * widthSeconds);
    let at = firstAtOrAfter(times, edge(0));
    for (let bin = 0; bin < nBins && at < times.length; bin++) {
      const end = edge(bin + 1);
      const from = at;
      while (at < times.length && times[at] < end) at += 1;
      if (at > from) put(trial, bin, at - from);
    }
  }
}

function firstAtOrAfter(times: Float64Array, time: number): number {
  let low = 0;
  let high = times.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (times[middle] < time) low = middle + 1;
    else high = middle;
  }
  return low;
}
