import type { IntakeProposal } from '@/lib/contracts/intake';
import { arraysOf } from '@/lib/intake/proposal/row-lengths';
import { isTable, type OfferedArray, type OfferedFile } from '@/lib/intake/proposal/offered-file';

type Question = IntakeProposal['questions'][number];
const WIDTH = /^(?:bin[_ ]?(?:width|size)?|dt)(?:[_ ]?(ms|s|sec|seconds))?$/i;
const START =
  /^(?:window[_ ]?start|t0|t[_ ]?start|bin[_ ]?start|start[_ ]?offset)(?:[_ ]?(ms|s|sec|seconds))?$/i;

/** Bin width and window start from single values whose names carry their unit; without a unit they are asked. */
export function proposeScalars(files: readonly OfferedFile[]): {
  binWidthMs?: number;
  windowStartMs?: number;
  questions: Question[];
} {
  const scalars = arraysOf(files).filter(
    (array) => array.shape.every((length) => length === 1) && !isTable(array.format),
  );
  const questions: Question[] = [];
  const find = (pattern: RegExp, field: string, question: string): number | undefined => {
    const found = scalars.flatMap((array) => {
      const unit = pattern.exec(array.path);
      return unit === null ? [] : [{ array, unit: unit[1]?.toLowerCase(), value: valueOf(array) }];
    });
    const values = new Set(
      found.flatMap(({ unit, value }) =>
        unit === undefined || value === null ? [] : [unit === 'ms' ? value : value * 1000],
      ),
    );
    if (values.size === 1) return tidy([...values][0]);
    const options = found.flatMap(({ value }) =>
      value === null ? [] : [`${value} ms`, `${tidy(value * 1000)} ms`],
    );
    questions.push({
      field,
      question,
      options: values.size > 1 ? [...values].map((value) => `${tidy(value)} ms`) : options,
    });
    return undefined;
  };
  const binWidthMs = find(WIDTH, 'binWidthMs', 'How wide is a bin, in milliseconds?');
  const windowStartMs = find(
    START,
    'windowStartMs',
    'When does the first bin begin, in milliseconds after the alignment event (negative: before it)?',
  );
  return {
    ...(binWidthMs === undefined ? {} : { binWidthMs }),
    ...(windowStartMs === undefined ? {} : { windowStartMs }),
    questions,
  };
}

function valueOf(array: OfferedArray): number | null {
  const value = Number(array.sample?.[0]);
  return array.sample?.[0] === undefined || !Number.isFinite(value) ? null : value;
}

/** 0.025 s is 25 ms and not 25.000000000000004. */
function tidy(value: number): number {
  return Number(value.toPrecision(12));
}
