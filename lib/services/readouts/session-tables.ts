import type { Column } from '@/lib/intake/column';

/** What a recipe is resolved against: a data version's shape and tables, without its counts. */
export interface SessionTables {
  nTrials: number;
  nUnits: number;
  nBins: number;
  binWidthMs: number;
  windowStartMs: number;
  /** Each nTrials long, in session order. */
  trials: Column[];
  /** Each nUnits long. */
  units: Column[];
  /** Over all trials and bins of the session; null where they have not been worked out. */
  unitFacts: {
    /** Spikes per second. */
    meanRateHz: Float64Array;
    /** Share of trials with at least one spike, 0…1. */
    presence: Float64Array;
  } | null;
}
