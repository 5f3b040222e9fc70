import type { Interval } from '@/lib/contracts/readout';

/** Name of one of the two intervals and what it covers. */
export interface IntervalWords {
  name: string;
  covers: string;
}

/** The nested cross-validation interval, in words. */
export function nestedIntervalWords(interval: Interval): IntervalWords {
  return {
    name: 'Nested cross-validation',
    covers: `${Math.round(interval.level * 100)} % interval (Bates, Hastie and Tibshirani) of the R² of readouts fitted like these. It does not cover another session or animal.`,
  };
}
