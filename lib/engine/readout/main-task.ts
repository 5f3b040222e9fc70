import type { DesignSpec, FeatureSpec, ReadoutInput } from '@/lib/engine/readout/types';

/** The main readout's features. */
export function mainFeatures(input: ReadoutInput): FeatureSpec {
  return { kind: input.features, window: input.window, transform: input.transform, units: { all: true } };
}

/** What stands beside the main readout's features. */
export function mainDesign(input: ReadoutInput): DesignSpec {
  const isAdjusted = input.nuisance.handling === 'adjust' && input.nuisance.variables.length > 0;
  return { kind: isAdjusted ? 'adjusted' : 'plain', nuisanceOf: -1 };
}
