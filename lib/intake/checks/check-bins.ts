import type { Problem } from '@/lib/contracts/problem';
import type { SessionData } from '@/lib/intake/session-data';

/** Bin widths that look like another unit, windows without a bin before the event, and a shape that was only assumed. */
export function checkBins(data: SessionData, longWithoutShape: boolean): Problem[] {
  const problems: Problem[] = [];
  if (data.binWidthMs < 0.5 || data.binWidthMs > 2000)
    problems.push({
      code: 'bin-width-odd',
      severity: 'warns',
      message: `A bin is said to be ${data.binWidthMs} ms wide.`,
      remedy:
        data.binWidthMs < 0.5
          ? 'Give the width in milliseconds; it looks like seconds.'
          : 'Give the width in milliseconds.',
      place: {},
    });
  if (data.windowStartMs >= 0)
    problems.push({
      code: 'no-bins-before-event',
      severity: 'notes',
      message:
        'There is no bin before the alignment event, so no negative control from a window before it is possible.',
      remedy: 'Export some bins before the event if the recording has them.',
      place: {},
    });
  if (longWithoutShape)
    problems.push({
      code: 'long-shape-assumed',
      severity: 'notes',
      message: `The table does not say how many units and bins there are; the highest numbers in it gave ${data.nUnits} units and ${data.nBins} bins.`,
      remedy: 'If the last units or bins are silent, state the shape in the mapping.',
      place: {},
    });
  return problems;
}
