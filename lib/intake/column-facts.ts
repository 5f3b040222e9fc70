import type { ColumnFact } from '@/lib/contracts/session';
import type { Column } from '@/lib/intake/column';

/** What is kept about a column beside its values. */
export function columnFacts(column: Column): ColumnFact {
  if (column.type === 'category') {
    const present = column.values.filter((value) => value !== null);
    return {
      name: column.name,
      type: 'category',
      missing: column.values.length - present.length,
      distinct: new Set(present).size,
      min: null,
      max: null,
    };
  }
  const present = column.values.filter((value) => Number.isFinite(value));
  return {
    name: column.name,
    type: column.type,
    ...(column.type === 'circular' && column.periodDeg !== undefined ? { periodDeg: column.periodDeg } : {}),
    missing: column.values.length - present.length,
    distinct: new Set(present).size,
    min: present.length === 0 ? null : present.reduce((low, value) => Math.min(low, value)),
    max: present.length === 0 ? null : present.reduce((high, value) => Math.max(high, value)),
  };
}
