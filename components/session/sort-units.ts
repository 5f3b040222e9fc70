import type { UnitRow } from '@/components/session/unit-row';

/** What the unit table is sorted by: a fact, or a file's column by its place. */
export type UnitSortKey = 'unit' | 'rateHz' | 'presence' | 'fano' | 'out' | number;

function valueOf(row: UnitRow, key: UnitSortKey): number | string | null {
  if (typeof key === 'number') return row.values[key];
  if (key === 'out') return row.out?.reason ?? null;
  return row[key];
}

/** Units in the order asked for; missing values last in either direction, ties by unit number. */
export function sortUnits(rows: readonly UnitRow[], key: UnitSortKey, descending: boolean): UnitRow[] {
  const sign = descending ? -1 : 1;
  return [...rows].sort((a, b) => {
    const x = valueOf(a, key);
    const y = valueOf(b, key);
    if (x === null || y === null) return x === y ? a.unit - b.unit : x === null ? 1 : -1;
    const order =
      typeof x === 'number' && typeof y === 'number'
        ? x - y
        : String(x).localeCompare(String(y), 'en', { numeric: true });
    return order === 0 ? a.unit - b.unit : sign * order;
  });
}
