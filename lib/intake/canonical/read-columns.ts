import { tableFromIPC } from 'apache-arrow';
import type { Column } from '@/lib/intake/column';

/** The columns of a trials or units part (the bytes of its Arrow IPC file); nulls become NaN or null. */
export function readColumns(bytes: Uint8Array): Column[] {
  const table = tableFromIPC(bytes);
  return table.schema.fields.map((field, index): Column => {
    const vector = table.getChildAt(index);
    if (vector === null) throw new Error(`column ${field.name} is missing from its own table`);
    const type = field.metadata.get('outfold.type');
    if (type === 'category')
      return { name: field.name, type, values: Array.from(vector, (value: string | null) => value) };
    const values = Float64Array.from(vector, (value: number | null) => value ?? NaN);
    const period = field.metadata.get('outfold.periodDeg');
    return type === 'circular'
      ? {
          name: field.name,
          type,
          ...(period === undefined ? {} : { periodDeg: Number(period) }),
          values,
        }
      : { name: field.name, type: 'number', values };
  });
}
