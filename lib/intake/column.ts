/** A column of numbers; NaN means missing. Circular columns (directions) wrap at `periodDeg`. */
export interface NumberColumn {
  name: string;
  type: 'number' | 'circular';
  periodDeg?: number;
  values: Float64Array;
}

/** A column of names; null means missing. */
export interface CategoryColumn {
  name: string;
  type: 'category';
  values: (string | null)[];
}

/** One column of a trial or unit table. */
export type Column = NumberColumn | CategoryColumn;
