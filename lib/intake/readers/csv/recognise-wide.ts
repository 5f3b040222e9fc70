import { findWideColumns, type WideColumns } from '@/lib/intake/readers/csv/find-wide-columns';

/** The family of columns with two numbers in their names (`u0_b0`, `u0_b1` …) that fill a grid of units × bins, if there is one. */
export function recogniseWide(header: readonly string[]): WideColumns | null {
  const families = new Map<string, number>();
  for (const name of header) {
    const parts = /^(\D*)\d{1,7}(\D+)\d{1,7}(\D*)$/.exec(name);
    if (parts === null || /[{}]/.test(name)) continue;
    const pattern = `${parts[1]}{unit}${parts[2]}{bin}${parts[3]}`;
    families.set(pattern, (families.get(pattern) ?? 0) + 1);
  }
  const largest = [...families].sort((a, b) => b[1] - a[1])[0];
  if (largest === undefined || largest[1] < 2) return null;
  const found = findWideColumns(header, largest[0]);
  return 'columns' in found ? found : null;
}
