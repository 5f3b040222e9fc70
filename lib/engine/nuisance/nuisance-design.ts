/**
 * What was learnt about one nuisance variable from training trials: enough to code any other trial. Plain data.
 * `centre` has one entry a column: the column's training mean, which is taken off, so that 0 always means "as on average".
 */
export type NuisanceTerm =
  | { kind: 'linear' | 'quadratic'; name: string; mean: number; sd: number; centre: number[] }
  | { kind: 'spline'; name: string; knots: number[]; centre: number[] }
  | { kind: 'circular'; name: string; periodDeg: number; centre: number[] }
  | { kind: 'category'; name: string; levels: number[]; centre: number[] }
  | { kind: 'constant'; name: string; centre: number[] };

/** The columns that nuisance variables add, as fitted on training trials. */
export interface NuisanceDesign {
  terms: NuisanceTerm[];
  nColumns: number;
  /** One name a column, for people: "speed", "speed²", "block = 2", "direction (cos)". */
  columnNames: string[];
  /** Variables that do not vary on the training trials and so add no column. */
  constant: string[];
}
