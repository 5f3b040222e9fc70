import type { IntervalWords } from '@/components/readout/nested-interval-words';
import type { Interval } from '@/lib/contracts/readout';

/** The interval over held-out trials, in words. */
export function testTrialIntervalWords(interval: Interval): IntervalWords {
  return {
    name: 'Test-trial interval, readouts held fixed',
    covers: `${Math.round(interval.level * 100)} % interval over held-out trials or runs of them (BCa, Efron), the fitted readouts as they are. It leaves out what other training trials would have changed, so it holds the readouts’ R² less often than it says.`,
  };
}
