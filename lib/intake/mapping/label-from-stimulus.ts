import { EngineError } from '@/lib/engine/engine-error';
import type { Centring } from '@/lib/engine/label/centring';
import { realisedFractions } from '@/lib/engine/label/realised-fractions';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { StimulusVelocity } from '@/lib/intake/session-data';

/** The realised fraction of each trial (raw, NaN where nothing moves), its interval's ends, and the pooled fraction. */
export function fromStimulus(
  stimulus: StimulusVelocity,
  nTrials: number,
  centring: Centring,
): { fraction: Float64Array; low: Float64Array; high: Float64Array; pooled: number | null } {
  const { nLocations, nAxes, nFrames, velocity } = stimulus;
  try {
    const { trials, pooled } = realisedFractions(
      velocity,
      nTrials,
      { nLocations, nAxes, nFrames },
      { centring },
    );
    return {
      fraction: Float64Array.from(trials, (trial) => trial?.fraction ?? NaN),
      low: Float64Array.from(trials, (trial) => trial?.interval?.low ?? NaN),
      high: Float64Array.from(trials, (trial) => trial?.interval?.high ?? NaN),
      pooled,
    };
  } catch (error) {
    if (!(error instanceof EngineError)) throw error;
    throw new IntakeRefusal(
      'label-not-estimable',
      `${error.message}.`,
      'Check the axes of the velocities, or choose a column of the trial table as the label.',
      error.place.trial === undefined ? {} : { trial: error.place.trial },
    );
  }
}
