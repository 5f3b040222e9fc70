/** Indices (from 0) as people write them: "12, 311–319 and 8 more", counted from 1. `most` limits the stretches named. */
export function spellRanges(indices: readonly number[], most = 8): string {
  const sorted = [...indices].sort((a, b) => a - b);
  const runs: [number, number][] = [];
  for (const index of sorted) {
    const last = runs[runs.length - 1];
    if (last && index <= last[1] + 1) last[1] = index;
    else runs.push([index, index]);
  }
  const named = runs.slice(0, most).map(([a, b]) => (a === b ? `${a + 1}` : `${a + 1}–${b + 1}`));
  const rest = runs.slice(most).reduce((sum, [a, b]) => sum + b - a + 1, 0);
  return named.join(', ') + (rest > 0 ? ` and ${rest} more` : '');
}
