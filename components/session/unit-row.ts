/** A unit as the session sheet lists it. `unit` counts from 0; null is "cannot be worked out" or missing. */
export interface UnitRow {
  unit: number;
  rateHz: number;
  /** Share of trials with at least one spike. */
  presence: number;
  /** Variance over mean of the trial totals; null for a silent unit. */
  fano: number | null;
  /** Values of the file's unit columns, in the order of `columns` of the table. */
  values: readonly (number | string | null)[];
  /** Why it is left out, by whom; null while it is in. */
  out: { reason: string; authorName: string } | null;
}
