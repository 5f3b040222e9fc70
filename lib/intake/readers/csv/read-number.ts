const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const MISSING = new Set(['nan', 'na', 'n/a', 'null', 'none', '-nan', '+nan']);
const INFINITE = /^[+-]?inf(?:inity)?$/i;

/**
 * A table cell as a number: NaN for a cell that says “missing” (NaN, NA, null …), ±Infinity where it says so, null where
 * it is no number at all. A blank cell is none: callers decide what blank means, because blank is never 0.
 */
export function readNumber(cell: string): number | null {
  if (cell.length === 1) {
    const digit = cell.charCodeAt(0) - 48;
    if (digit >= 0 && digit <= 9) return digit;
  }
  const text = cell.trim();
  if (NUMBER.test(text)) return Number(text);
  if (MISSING.has(text.toLowerCase())) return NaN;
  if (INFINITE.test(text)) return text.startsWith('-') ? -Infinity : Infinity;
  return null;
}
