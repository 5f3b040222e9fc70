import { Draws } from './draws';
import type { RecordingPlan } from './recording-plan';
import { makeStimulus } from './make-stimulus';
import { makeUnits } from './make-units';

/** Bins of a made-up recording: 20 ms wide, from 200 ms before scene onset to 1,000 ms after it. */
export const binMs = 20;
export const windowStartMs = -200;
export const nBins = 60;
export const sceneMs = 640;
/** Visual latency of the made-up units. */
const latencyMs = 40;

export interface MadeRecording {
  /** Trials × units × bins, row-major. */
  counts: Uint8Array;
  nTrials: number;
  nUnits: number;
  nominal: Float64Array;
  realised: Float64Array;
  /** Geometric mean speed of the scene, deg/s. */
  speed: Float64Array;
  directionDeg: Float64Array;
  contrast: Float64Array;
  pupilMm: Float64Array;
  block: Int32Array;
  /** Scene onset in seconds of the recording's clock. */
  trialStartS: Float64Array;
  unitArea: string[];
  unitDepthUm: Float64Array;
  isolation: Float64Array;
}

/**
 * Draws a recording session of an invented population: direction and speed tuning, a gain on the shared-motion fraction
 * for some units, a gain shared by all, low-rank noise correlations, slow drift, and over-dispersed spike counts.
 * Everything follows from `plan.seed`.
 */
export function makeRecording(plan: RecordingPlan): MadeRecording {
  const draws = new Draws(plan.seed);
  const { nTrials } = plan;
  const stimulus = makeStimulus(draws, plan, { nFrames: sceneMs / binMs, frameMs: binMs });
  const units = makeUnits(draws, plan);
  const nUnits = units.length;
  const nFactors = 3;
  const factorSd = 0.18 / Math.sqrt(nFactors);
  const loading = units.map(() => Array.from({ length: nFactors }, () => draws.normal(0, factorSd)));
  const seen = Array.from({ length: nTrials }, (_, trial) => trial);
  if (plan.design === 'noise') draws.shuffle(seen);

  const counts = new Uint8Array(nTrials * nUnits * nBins);
  const pupilMm = new Float64Array(nTrials);
  let arousal = 0;
  for (let trial = 0; trial < nTrials; trial++) {
    const source = seen[trial];
    const progress = trial / nTrials - 0.5;
    arousal = 0.97 * arousal + draws.normal(0, 0.24);
    pupilMm[trial] = Math.max(1.2, 2.9 + 0.35 * arousal + draws.normal(0, 0.12));
    const sharedGain = Math.exp(draws.normal(0, 0.15) + 0.05 * arousal);
    const factors = Array.from({ length: nFactors }, () => draws.normal());
    for (let u = 0; u < nUnits; u++) {
      const unit = units[u];
      let noise = 0;
      for (let f = 0; f < nFactors; f++) noise += factors[f] * loading[u][f];
      const drift = unit.driftSlope * progress + 0.1 * Math.sin(2 * Math.PI * progress + unit.driftPhase);
      // Only the response to the scene can follow what the scene shows: the bins before onset carry none of it.
      const sceneGain =
        (0.6 + 0.4 * stimulus.contrast[trial]) * (1 + unit.labelGain * (stimulus.realised[source] - 0.5));
      const gain = sharedGain * Math.exp(noise + drift);
      const trialDispersion = draws.gamma(unit.dispersion, 1 / unit.dispersion);
      for (let bin = 0; bin < nBins; bin++) {
        const sceneTimeMs = windowStartMs + bin * binMs - latencyMs;
        let rateHz = unit.baseHz;
        if (sceneTimeMs >= 0 && sceneTimeMs < sceneMs) {
          const drive = stimulus.drive(source, Math.floor(sceneTimeMs / binMs), unit);
          const onset =
            1 - Math.exp(-(sceneTimeMs + 10) / 60) + 0.8 * Math.exp(-(((sceneTimeMs - 80) / 30) ** 2));
          rateHz += unit.peakHz * drive * onset * sceneGain;
        } else if (sceneTimeMs >= sceneMs) {
          rateHz += 0.35 * unit.baseHz * Math.exp(-(sceneTimeMs - sceneMs) / 120);
        }
        const mean = (rateHz * gain * trialDispersion * binMs) / 1000;
        counts[(trial * nUnits + u) * nBins + bin] = Math.min(255, draws.poisson(mean));
      }
    }
  }
  const trialsPerBlock = nTrials / plan.nBlocks;
  return {
    counts,
    nTrials,
    nUnits,
    nominal: stimulus.nominal,
    realised: stimulus.realised,
    speed: stimulus.speed,
    directionDeg: stimulus.directionDeg,
    contrast: stimulus.contrast,
    pupilMm,
    block: Int32Array.from({ length: nTrials }, (_, trial) => 1 + Math.floor(trial / trialsPerBlock)),
    trialStartS: Float64Array.from(
      { length: nTrials },
      (_, trial) => 12 + trial * 10.5 + Math.floor(trial / trialsPerBlock) * 60,
    ),
    unitArea: units.map((unit) => unit.area),
    unitDepthUm: Float64Array.from(units, (unit) => unit.depthUm),
    isolation: Float64Array.from(units, (unit) => unit.isolation),
  };
}
