import type { Problem } from '@/lib/contracts/problem';
import { correlation } from '@/lib/intake/checks/correlation';
import type { LabelChoice, SessionData } from '@/lib/intake/session-data';

const FEW_TRIALS = 20;

/** Labels that cannot be read out, or that look like a slip: constant, infinite, missing, outside 0 to 1, in percent, unbalanced. */
export function checkLabels(data: SessionData): Problem[] {
  const problems = data.labels.flatMap((label) => {
    const column = data.trials.find((one) => one.name === label.column);
    return column === undefined || column.type === 'category' ? [] : checkLabel(label, column.values);
  });
  return [...problems, ...ceilingOf(data)];
}

/** How much of the nominal label the realised one can tell at most, where a session brings one of each. */
function ceilingOf(data: SessionData): Problem[] {
  const valuesOf = (kind: LabelChoice['kind']): { name: string; values: Float64Array } | null => {
    const labels = data.labels.filter((label) => label.kind === kind);
    const column = labels.length === 1 ? data.trials.find((one) => one.name === labels[0].column) : undefined;
    return column === undefined || column.type === 'category'
      ? null
      : { name: column.name, values: column.values };
  };
  const nominal = valuesOf('nominal');
  const realised = valuesOf('realised');
  if (nominal === null || realised === null) return [];
  const { r, n } = correlation(nominal.values, realised.values);
  if (Number.isNaN(r)) return [];
  return [
    {
      code: 'stimulus-ceiling',
      severity: 'notes',
      message: `The realised label “${realised.name}” shares ${(100 * r * r).toFixed(0)} % of the variance of the nominal label “${nominal.name}” over ${n} trials (r² = ${(r * r).toFixed(3)}).`,
      remedy: 'A readout that follows the realised label cannot reach more of the nominal one than this.',
      place: { path: realised.name },
    },
  ];
}

function checkLabel(label: LabelChoice, values: Float64Array): Problem[] {
  const path = label.column;
  const problems: Problem[] = [];
  const add = (
    code: string,
    severity: Problem['severity'],
    message: string,
    remedy: string,
    trial?: number,
  ): void => {
    problems.push({
      code,
      severity,
      message,
      remedy,
      place: trial === undefined ? { path } : { path, trial },
    });
  };
  const infinite = values.findIndex((value) => value === Infinity || value === -Infinity);
  if (infinite !== -1)
    add(
      'label-infinite',
      'stops',
      `The label “${path}” is infinite in a trial.`,
      'Correct the value, or leave it out.',
      infinite,
    );
  const present = values.filter((value) => Number.isFinite(value));
  if (present.length === 0) {
    add(
      'label-missing',
      'stops',
      `The label “${path}” has no value in any trial.`,
      'Choose the column that holds the label.',
    );
    return problems;
  }
  const missing = values.findIndex((value) => Number.isNaN(value));
  if (missing !== -1)
    add(
      'label-missing',
      'warns',
      `The label “${path}” is missing in ${values.filter(Number.isNaN).length} of ${values.length} trials; the first is given.`,
      'Trials without a label are dropped before folding, and counted.',
      missing,
    );
  const levels = new Map<number, number>();
  for (const value of present) levels.set(value, (levels.get(value) ?? 0) + 1);
  if (levels.size === 1) {
    add(
      'label-constant',
      'stops',
      `The label “${path}” is ${present[0]} in every trial: there is nothing to read out.`,
      'Choose a column that varies.',
    );
    return problems;
  }
  if (present.length < FEW_TRIALS)
    add(
      'label-few-trials',
      'warns',
      `Only ${present.length} trials have the label “${path}”.`,
      'A readout of so few trials tells little; check that the whole session was sent.',
    );
  if (label.kind !== 'other') checkRange(values, path, add);
  checkBalance(levels, present.length, path, add);
  return problems;
}

type Add = (
  code: string,
  severity: Problem['severity'],
  message: string,
  remedy: string,
  trial?: number,
) => void;

/** A fraction lies within 0 and 1; a realised one may leave it a little, because it is an estimate. */
function checkRange(values: Float64Array, path: string, add: Add): void {
  const outside = values.findIndex((value) => value < 0 || value > 1);
  if (outside === -1) return;
  const largest = values.reduce((high, value) => (value > high ? value : high), -Infinity);
  const smallest = values.reduce((low, value) => (value < low ? value : low), Infinity);
  if (smallest >= 0 && largest > 1.5 && largest <= 100)
    add(
      'label-percent',
      'warns',
      `The label “${path}” runs from ${smallest} to ${largest}, which looks like percent.`,
      'Divide by 100 if it is a fraction, or give the label the kind “other”.',
      outside,
    );
  else
    add(
      'label-range',
      'warns',
      `The label “${path}” leaves the range of a fraction, 0 to 1, in ${values.filter((value) => value < 0 || value > 1).length} trials; the first is given.`,
      'Check the values, or give the label the kind “other”.',
      outside,
    );
}

function checkBalance(levels: ReadonlyMap<number, number>, nTrials: number, path: string, add: Add): void {
  if (levels.size > 20 || levels.size * 3 > nTrials) return;
  const counts = [...levels].sort((a, b) => a[1] - b[1]);
  const [rarest, commonest] = [counts[0], counts[counts.length - 1]];
  if (rarest[1] * 2 >= commonest[1]) return;
  add(
    'label-unbalanced',
    'notes',
    `The label “${path}” has level ${rarest[0]} in ${rarest[1]} trials and level ${commonest[0]} in ${commonest[1]}.`,
    'Stratified folds keep the levels together; read the per-level values.',
  );
}
