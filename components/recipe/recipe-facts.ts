import type { SheetColumn } from '@/components/session/sheet-column';
import type { LabelFact } from '@/lib/contracts/session';

/** What the page of a new readout knows of its session, so that most checks answer at once. Indices count from 0. */
export interface RecipeFacts {
  sessionId: string;
  nTrials: number;
  nBins: number;
  binWidthMs: number;
  windowStartMs: number;
  labels: readonly LabelFact[];
  trialColumns: readonly SheetColumn[];
  /** One a unit. */
  units: readonly { rateHz: number; presence: number; area: string | null }[];
  /** Name of the unit column that holds areas. */
  areaColumn: string | null;
  excludedTrials: readonly number[];
  excludedUnits: readonly number[];
  exclusionsVersion: number;
  blockColumn: string | null;
  /** Mean rate over the units of each trial, spikes/s. */
  rateHz: readonly (number | null)[];
  /** Mean rate over trials and units of each bin, spikes/s; null where it is not known. */
  populationRateHz: readonly number[] | null;
}
