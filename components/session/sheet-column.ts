/** A column of a trial or unit table as plain values that can cross to the browser; null is missing. */
export interface SheetColumn {
  name: string;
  type: 'number' | 'category' | 'circular';
  values: (number | string | null)[];
}

/** A column as the server holds it: NaN or null is missing. */
interface StoredColumn {
  name: string;
  type: SheetColumn['type'];
  values: ArrayLike<number> | readonly (string | null)[];
}

/** Turns a stored column into plain values. */
export function toSheetColumn({ name, type, values }: StoredColumn): SheetColumn {
  return {
    name,
    type,
    values: Array.from(values as ArrayLike<number | string | null>, (value) =>
      typeof value === 'number' && !Number.isFinite(value) ? null : value,
    ),
  };
}
