import type { Problem } from '@/lib/contracts/problem';

/** Whether the counts' axes have the lengths of the trial and unit tables; if swapped axes would fit, the remedy says so. */
export function compareLengths(
  shape: readonly [number, number, number],
  nTrialRows: number,
  nUnitRows: number | undefined,
  fileName: string,
): Problem[] {
  const problems: Problem[] = [];
  const compare = (axis: 'trial' | 'unit', length: number, rows: number): void => {
    if (length === rows) return;
    const fitting = (['trial', 'unit', 'bin'] as const).filter(
      (other, at) => other !== axis && shape[at] === rows,
    );
    problems.push({
      code: axis === 'trial' ? 'trials-disagree' : 'units-disagree',
      severity: 'stops',
      message: `The counts have ${length} ${axis}s; the ${axis} table has ${rows} rows.`,
      remedy:
        fitting.length > 0
          ? `The axis named ${fitting[0]} has ${rows}: check whether the axes are in another order.`
          : `Send the ${axis} table that belongs to these counts.`,
      place: { file: fileName },
    });
  };
  compare('trial', shape[0], nTrialRows);
  if (nUnitRows !== undefined) compare('unit', shape[1], nUnitRows);
  return problems;
}
