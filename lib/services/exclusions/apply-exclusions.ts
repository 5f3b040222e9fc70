/** What one entry says: indices left out, or put back again. */
export interface ExclusionStep {
  action: 'leaveOut' | 'putBack';
  kind: 'trial' | 'unit';
  indices: readonly number[];
}

/** The trials and units (from 0, ascending) that are left out after all entries, applied in order. Pure. */
export function applyExclusions(steps: readonly ExclusionStep[]): { trials: number[]; units: number[] } {
  const left = { trial: new Set<number>(), unit: new Set<number>() };
  for (const { action, kind, indices } of steps)
    for (const index of indices)
      if (action === 'leaveOut') left[kind].add(index);
      else left[kind].delete(index);
  const ascending = (set: Set<number>) => [...set].sort((a, b) => a - b);
  return { trials: ascending(left.trial), units: ascending(left.unit) };
}
