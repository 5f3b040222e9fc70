import type { ArrayUse } from '@/lib/client/intake/array-use';
import type { CountsAxis, Intake, LabelSource } from '@/lib/contracts/intake';

/** A mapping while it is being made: what each array is used as, and what the counts' axes and bins are. */
export interface IntakeDraft {
  /** By arrayKey. What is not named is not used. */
  uses: Record<string, ArrayUse>;
  /** The axes of the counts array, in the file's order. */
  axes: CountsAxis[];
  binWidthMs: number | null;
  windowStartMs: number | null;
  /** Whether the numbers of trials, units and bins in a text table start at 0 or 1; undefined lets the reader tell. */
  base: 0 | 1 | undefined;
  /** For a table with one row a trial, unit and bin: how many of each there are; used when all three are given, otherwise the rows tell. */
  longShape: Record<CountsAxis, number | null>;
  /** The column of a wide table that numbers its trials. */
  wideTrial: string | undefined;
  /** Names given to columns other than their arrays' own, by arrayKey. */
  names: Record<string, string>;
  /** Labels that are worked out from others. */
  derivedLabels: LabelSource[];
  stimulus: Intake['stimulus'];
}
