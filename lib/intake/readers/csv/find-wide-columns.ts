/** Columns of a wide table: `columns[unit · nBins + bin]` is the index of that unit's and bin's column in the header. */
export interface WideColumns {
  pattern: string;
  base: 0 | 1;
  nUnits: number;
  nBins: number;
  columns: Int32Array;
}

/** Why a pattern does not describe a header. */
export interface WideFault {
  code: 'wide-pattern' | 'wide-none' | 'wide-gaps' | 'wide-duplicate';
  message: string;
}

/**
 * Finds the columns that a pattern such as `u{unit}_b{bin}` names; without `{bin}` each unit has one bin. Units and bins
 * must be numbered without gaps from `base` (0 or 1; told from the smallest number if it is not given).
 */
export function findWideColumns(
  header: readonly string[],
  pattern: string,
  base?: 0 | 1,
): WideColumns | WideFault {
  const parts = pattern.split(/(\{unit\}|\{bin\})/);
  if (
    parts.filter((part) => part === '{unit}').length !== 1 ||
    parts.filter((part) => part === '{bin}').length > 1
  )
    return {
      code: 'wide-pattern',
      message: `The pattern “${pattern}” must hold {unit} once and {bin} at most once.`,
    };
  const isSlot = (part: string): part is '{unit}' | '{bin}' => part === '{unit}' || part === '{bin}';
  const order = parts.filter(isSlot);
  const source = parts.map((part) => (isSlot(part) ? '(\\d{1,7})' : escape(part))).join('');
  const regex = new RegExp(`^${source}$`);
  const found: { unit: number; bin: number; at: number }[] = [];
  header.forEach((name, at) => {
    const match = regex.exec(name);
    if (match === null) return;
    const unitAt = order.indexOf('{unit}') + 1;
    const binAt = order.indexOf('{bin}') + 1;
    found.push({ unit: Number(match[unitAt]), bin: binAt === 0 ? 0 : Number(match[binAt]), at });
  });
  if (found.length === 0) return { code: 'wide-none', message: `No column is named like “${pattern}”.` };
  const hasBin = order.includes('{bin}');
  const lowest = (key: 'unit' | 'bin'): number =>
    found.reduce((low, one) => Math.min(low, one[key]), Infinity);
  const from = base ?? (lowest('unit') === 1 && (!hasBin || lowest('bin') === 1) ? 1 : 0);
  const binFrom = hasBin ? from : 0;
  const nUnits = found.reduce((high, one) => Math.max(high, one.unit), 0) - from + 1;
  const nBins = found.reduce((high, one) => Math.max(high, one.bin), 0) - binFrom + 1;
  if (nUnits * nBins > header.length || lowest('unit') < from || lowest('bin') < binFrom)
    return gaps(pattern, found.length, nUnits, nBins, from);
  const columns = new Int32Array(nUnits * nBins).fill(-1);
  for (const one of found) {
    const cell = (one.unit - from) * nBins + one.bin - binFrom;
    if (columns[cell] !== -1)
      return { code: 'wide-duplicate', message: `Two columns stand for unit ${one.unit}, bin ${one.bin}.` };
    columns[cell] = one.at;
  }
  if (columns.includes(-1)) return gaps(pattern, found.length, nUnits, nBins, from);
  return { pattern, base: from, nUnits, nBins, columns };
}

function gaps(pattern: string, found: number, nUnits: number, nBins: number, from: number): WideFault {
  return {
    code: 'wide-gaps',
    message: `${found} columns are named like “${pattern}”, but ${nUnits} units × ${nBins} bins numbered from ${from} need ${nUnits * nBins}.`,
  };
}

function escape(text: string): string {
  return text.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
}
