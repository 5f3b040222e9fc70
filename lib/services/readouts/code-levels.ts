import type { Column } from '@/lib/intake/column';

/** Levels of a column as codes 0, 1 …, in ascending order of the levels; −1 where the value is missing. */
export function codeLevels(column: Column): { codes: Int32Array; names: string[] } {
  const values: (number | string | null)[] = [...column.values];
  const isMissing = (value: number | string | null) => value === null || Number.isNaN(value);
  const levels = [...new Set(values.filter((value) => !isMissing(value)))] as (number | string)[];
  // Code units, not a locale: the order must be the same on every machine.
  levels.sort((a, b) => (a < b ? -1 : a > b ? 1 : 0));
  const codeOf = new Map(levels.map((level, code) => [level, code]));
  return {
    codes: Int32Array.from(values, (value) =>
      isMissing(value) ? -1 : codeOf.get(value as number | string)!,
    ),
    names: levels.map(String),
  };
}
