import type { FieldFault } from '@/lib/errors/app-error';

const maxFaults = 100;

/**
 * What is wrong with the indices of an exclusion: beyond the session's data, or (to be put back) not left out.
 * At most 100 faults are named. Pure.
 *
 * @param count how many trials or units the session has
 * @param leftOut the indices that are left out now
 */
export function exclusionFaults(input: {
  action: 'leaveOut' | 'putBack';
  kind: 'trial' | 'unit';
  indices: readonly number[];
  count: number;
  leftOut: readonly number[];
}): FieldFault[] {
  const leftOut = new Set(input.leftOut);
  const faults: FieldFault[] = [];
  for (const [position, index] of input.indices.entries()) {
    const pointer = `/${input.kind}s/${position}`;
    if (index >= input.count)
      faults.push({
        pointer,
        code: 'out-of-range',
        detail: `there is no ${input.kind} ${index}: the session has ${input.count}, counted from 0`,
      });
    else if (input.action === 'putBack' && !leftOut.has(index))
      faults.push({ pointer, code: 'not-left-out', detail: `${input.kind} ${index} is not left out` });
    if (faults.length === maxFaults) break;
  }
  return faults;
}
