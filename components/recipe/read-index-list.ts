/** Reads "1-20, 34" (counted from 1) as ascending indices from 0; null where a part is not a number or range within `count`. */
export function readIndexList(text: string, count: number): number[] | null {
  const found = new Set<number>();
  const parts = text.split(/[\s,;]+/).filter((part) => part !== '');
  for (const part of parts) {
    const match = /^(\d+)(?:[-–](\d+))?$/.exec(part);
    if (!match) return null;
    const from = Number(match[1]);
    const to = match[2] === undefined ? from : Number(match[2]);
    if (from < 1 || to < from || to > count) return null;
    for (let index = from - 1; index < to; index += 1) found.add(index);
  }
  return found.size === 0 ? null : [...found].sort((a, b) => a - b);
}
