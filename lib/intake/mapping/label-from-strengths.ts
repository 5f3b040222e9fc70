import { EngineError } from '@/lib/engine/engine-error';
import { nominalFractions } from '@/lib/engine/label/nominal-fractions';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';

/** The nominal fraction from a shared and an own strength, trial by trial; null where both are 0. */
export function fromStrengths(shared: Float64Array, own: Float64Array): (number | null)[] {
  try {
    return nominalFractions(shared, own);
  } catch (error) {
    if (!(error instanceof EngineError)) throw error;
    throw new IntakeRefusal(
      'label-strengths',
      `${error.message}.`,
      'Fill in both strengths in every trial.',
      {
        ...(error.place.trial === undefined ? {} : { trial: error.place.trial }),
      },
    );
  }
}
