import type { Problem } from '@/lib/contracts/problem';
import type { Column, NumberColumn } from '@/lib/intake/column';
import type { SessionData } from '@/lib/intake/session-data';

const ID_NAME = /^trial(?:[_ ]?(?:id|number|no))?$/i;
const START_NAME = /^(?:trial[_ ]?)?(?:start|onset)(?:[_ ]?time)?(?:[_ ]?(?:s|sec|ms))?$/i;
const STOP_NAME = /^(?:trial[_ ]?)?(?:stop|end|offset)(?:[_ ]?time)?(?:[_ ]?(?:s|sec|ms))?$/i;

/** Slips in the trial table: identifiers missing or twice, times out of order, overlapping or in the wrong unit, missing values. */
export function checkTrialTable(data: SessionData): Problem[] {
  const problems: Problem[] = [];
  const isLabel = new Set(data.labels.map((label) => label.column));
  for (const column of data.trials) {
    if (ID_NAME.test(column.name)) problems.push(...checkIds(column));
    else if (!isLabel.has(column.name)) problems.push(...checkMissing(column));
  }
  const numbers = data.trials.filter((column): column is NumberColumn => column.type === 'number');
  const start = numbers.find((column) => START_NAME.test(column.name));
  const stop = numbers.find((column) => STOP_NAME.test(column.name));
  if (start) problems.push(...checkTimes(start, stop, data.binWidthMs * data.nBins));
  return problems;
}

function checkIds(column: Column): Problem[] {
  const seen = new Set<number | string>();
  const path = column.name;
  for (let trial = 0; trial < column.values.length; trial++) {
    const value = column.values[trial];
    if (value === null || (typeof value === 'number' && Number.isNaN(value)))
      return [
        problem(
          'trial-id-missing',
          'stops',
          `A trial has no entry in “${path}”.`,
          'Fill in the trial numbers.',
          { path, trial },
        ),
      ];
    if (seen.has(value))
      return [
        problem(
          'trial-id-duplicate',
          'warns',
          `“${path}” holds ${value} twice; the second place is given.`,
          'Check that no trial was exported twice. If numbers start again in each block, accept this.',
          { path, trial },
        ),
      ];
    seen.add(value);
  }
  return [];
}

function checkMissing(column: Column): Problem[] {
  const isMissing = (value: number | string | null): boolean =>
    value === null || (typeof value === 'number' && !Number.isFinite(value));
  const values: ArrayLike<number | string | null> = column.values;
  let first = -1;
  let times = 0;
  for (let trial = 0; trial < values.length; trial++)
    if (isMissing(values[trial])) {
      times += 1;
      if (first === -1) first = trial;
    }
  if (times === 0) return [];
  return [
    problem(
      'column-missing',
      'notes',
      `“${column.name}” is missing or not finite in ${times} of ${values.length} trials; the first is given.`,
      'A readout that uses the column drops those trials before folding, and counts them.',
      { path: column.name, trial: first },
    ),
  ];
}

function checkTimes(start: NumberColumn, stop: NumberColumn | undefined, windowMs: number): Problem[] {
  const { values, name: path } = start;
  const gaps = values.slice(1).map((value, at) => value - values[at]);
  const backwards = gaps.findIndex((gap) => gap < 0);
  if (backwards !== -1)
    return [
      problem(
        'times-unsorted',
        'warns',
        `“${path}” goes back in time; the first such trial is given.`,
        'Sort the trials by time: trial order is used for drift and for contiguous folds.',
        { path, trial: backwards + 1 },
      ),
    ];
  const same = gaps.findIndex((gap) => gap === 0);
  if (same !== -1)
    return [
      problem(
        'times-duplicate',
        'warns',
        `Two trials have the same “${path}”; the second is given.`,
        'Check that no trial was exported twice.',
        { path, trial: same + 1 },
      ),
    ];
  const sorted = gaps.filter((gap) => Number.isFinite(gap)).sort();
  const median = sorted[sorted.length >> 1] ?? NaN;
  const problems: Problem[] = [];
  if (!/ms$/i.test(path) && median >= 200)
    problems.push(
      problem(
        'times-milliseconds',
        'warns',
        `Trials are ${median} apart in “${path}”: in seconds that is long, so these may be milliseconds.`,
        'Give times in seconds, or end the column’s name in “ms”.',
        { path },
      ),
    );
  if (stop) {
    const overlap = stop.values.findIndex(
      (end, trial) => trial + 1 < values.length && end > values[trial + 1],
    );
    if (overlap !== -1)
      problems.push(
        problem(
          'trials-overlap',
          'warns',
          'A trial ends after the next one has begun; the first such trial is given.',
          'Check the times: spikes in the overlap count twice.',
          { path: stop.name, trial: overlap },
        ),
      );
  } else if (Number.isFinite(median) && median > 0) {
    const unit = /ms$/i.test(path) || median >= 200 ? 1 : 1000;
    const close = gaps.findIndex((gap) => gap * unit < windowMs - 1e-6);
    if (close !== -1)
      problems.push(
        problem(
          'trials-overlap',
          'warns',
          `A trial begins less than ${windowMs} ms, the length of its bins, after the one before; the first such trial is given.`,
          'Check the times and the bin width: spikes in the overlap count twice.',
          { path, trial: close + 1 },
        ),
      );
  }
  return problems;
}

function problem(
  code: string,
  severity: Problem['severity'],
  message: string,
  remedy: string,
  place: Problem['place'],
): Problem {
  return { code, severity, message, remedy, place };
}
