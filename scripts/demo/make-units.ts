import type { Draws } from './draws';
import type { SceneTuning } from './make-stimulus';
import type { RecordingPlan } from './recording-plan';

export interface MadeUnit extends SceneTuning {
  area: string;
  depthUm: number;
  /** Isolation quality as a made-up sorter would give it, 0 to 1. */
  isolation: number;
  baseHz: number;
  peakHz: number;
  /** Gamma shape of the trial-to-trial gain: smaller is more variable than Poisson. */
  dispersion: number;
  /** Relative change of rate per unit of shared-motion fraction; 0 for units that don't follow it. */
  labelGain: number;
  driftSlope: number;
  driftPhase: number;
}

/** Draws a population: depths along the probe, tuning, rates, drift, and which units follow the label. */
export function makeUnits(draws: Draws, plan: RecordingPlan): MadeUnit[] {
  const units: MadeUnit[] = [];
  let depthUm = 180;
  for (const area of plan.areas) {
    for (let i = 0; i < area.nUnits; i++) {
      depthUm += draws.between(4, 26);
      const isolation = Math.min(0.999, Math.max(0.4, draws.normal(0.92, 0.07)));
      const silent = draws.uniform() < 0.015;
      const follows = plan.design === 'signal' && draws.uniform() < plan.carriers;
      units.push({
        area: area.name,
        depthUm: Math.round(depthUm),
        isolation: Math.round(isolation * 1000) / 1000,
        location: draws.integer(12),
        preferredDirection: draws.between(0, 2 * Math.PI),
        directionWidth: draws.gamma(3, 0.5),
        preferredSpeed: Math.exp(draws.normal(1.3, 0.5)),
        speedWidth: draws.between(0.5, 1.1) * (plan.design === 'speedTied' ? 0.8 : 1),
        baseHz: silent ? 0 : draws.gamma(2, 1),
        peakHz: silent ? 0 : draws.gamma(3, 5),
        dispersion: draws.between(4, 14),
        labelGain: follows ? (draws.uniform() < 0.5 ? -1 : 1) * draws.between(0.25, 0.8) : 0,
        driftSlope: draws.normal(0, plan.driftSd),
        driftPhase: draws.between(0, 2 * Math.PI),
      });
    }
  }
  return units;
}
