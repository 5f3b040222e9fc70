import type { Column } from '@/lib/intake/column';
import type { ColumnWish } from '@/lib/intake/mapping/column-wish';

/** A number column of the wished kind over `values`; a circular one has the period 360° unless another is named. */
export function makeColumn(wish: ColumnWish, values: Float64Array | (string | null)[]): Column {
  if (!(values instanceof Float64Array)) return { name: wish.name, type: 'category', values };
  return wish.type === 'circular'
    ? { name: wish.name, type: 'circular', periodDeg: wish.periodDeg ?? 360, values }
    : { name: wish.name, type: 'number', values };
}
