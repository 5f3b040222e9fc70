import type { Draws } from './draws';
import type { RecordingPlan } from './recording-plan';

/** Tuning that a unit brings to the scene. */
export interface SceneTuning {
  location: number;
  preferredDirection: number;
  directionWidth: number;
  preferredSpeed: number;
  speedWidth: number;
}

export interface MadeStimulus {
  nominal: Float64Array;
  realised: Float64Array;
  speed: Float64Array;
  directionDeg: Float64Array;
  contrast: Float64Array;
  /** Tuned drive, 0 to 1, of a unit in one frame of one trial. */
  drive(trial: number, frame: number, tuning: SceneTuning): number;
}

const nLocations = 12;
const levels = [0, 0.25, 0.5, 0.75, 1];
/** Correlation time of the made-up motion. */
const tauMs = 100;

/**
 * Draws the scenes: at each of 12 locations the velocity is a drift, a component common to all locations and the location's
 * own, both Ornstein–Uhlenbeck; the nominal fraction is the common share of the variance. The realised fraction is the common
 * share of the energy that the trial really had. Levels are balanced within blocks, as a careful design would have them.
 */
export function makeStimulus(
  draws: Draws,
  plan: RecordingPlan,
  frames: { nFrames: number; frameMs: number },
): MadeStimulus {
  const { nTrials } = plan;
  const { nFrames, frameMs } = frames;
  const keep = Math.exp(-frameMs / tauMs);
  const renew = Math.sqrt(1 - keep * keep);
  const path = (out: Float32Array, offset: number): void => {
    out[offset] = draws.normal();
    for (let frame = 1; frame < nFrames; frame++)
      out[offset + frame] = keep * out[offset + frame - 1] + renew * draws.normal();
  };

  const nominal = new Float64Array(nTrials);
  const perBlock = nTrials / plan.nBlocks;
  for (let block = 0; block < plan.nBlocks; block++) {
    const order = draws.shuffle(Array.from({ length: perBlock }, (_, i) => levels[i % levels.length]));
    order.forEach((level, i) => (nominal[block * perBlock + i] = level));
  }
  const realised = new Float64Array(nTrials);
  const speed = new Float64Array(nTrials);
  const directionDeg = new Float64Array(nTrials);
  const contrast = new Float64Array(nTrials);
  const stride = nLocations * nFrames;
  const pace = new Float32Array(nTrials * stride);
  const heading = new Float32Array(nTrials * stride);
  const common = new Float32Array(2 * nFrames);
  const own = new Float32Array(2 * nLocations * nFrames);

  for (let trial = 0; trial < nTrials; trial++) {
    const fraction = nominal[trial];
    const scale =
      plan.design === 'speedTied'
        ? Math.exp(1 + 0.9 * (fraction - 0.5) + draws.normal(0, 0.12))
        : Math.exp(draws.normal(1.2, 0.25));
    const direction = draws.integer(8) * (Math.PI / 4);
    directionDeg[trial] = (direction * 180) / Math.PI;
    contrast[trial] = [0.25, 0.5, 1][draws.integer(3)];
    for (let axis = 0; axis < 2; axis++) {
      path(common, axis * nFrames);
      for (let location = 0; location < nLocations; location++)
        path(own, (axis * nLocations + location) * nFrames);
    }
    const toCommon = Math.sqrt(fraction);
    const toOwn = Math.sqrt(1 - fraction);
    let commonEnergy = 0;
    let ownEnergy = 0;
    let meanSpeed = 0;
    for (let frame = 0; frame < nFrames; frame++) {
      const cx = toCommon * common[frame];
      const cy = toCommon * common[nFrames + frame];
      commonEnergy += cx * cx + cy * cy;
      for (let location = 0; location < nLocations; location++) {
        const ex = toOwn * own[location * nFrames + frame];
        const ey = toOwn * own[(nLocations + location) * nFrames + frame];
        ownEnergy += (ex * ex + ey * ey) / nLocations;
        const vx = scale * (cx + ex + 1.2 * Math.cos(direction));
        const vy = scale * (cy + ey + 1.2 * Math.sin(direction));
        const at = trial * stride + location * nFrames + frame;
        pace[at] = Math.hypot(vx, vy);
        heading[at] = Math.atan2(vy, vx);
        meanSpeed += pace[at];
      }
    }
    realised[trial] = commonEnergy / (commonEnergy + ownEnergy);
    speed[trial] = meanSpeed / stride;
  }

  return {
    nominal,
    realised,
    speed,
    directionDeg,
    contrast,
    drive(trial, frame, tuning) {
      const at = trial * stride + tuning.location * nFrames + frame;
      const turn = Math.cos(heading[at] - tuning.preferredDirection) - 1;
      const octaves = (Math.log(pace[at] + 0.3) - Math.log(tuning.preferredSpeed)) / tuning.speedWidth;
      return Math.exp(tuning.directionWidth * turn - 0.5 * octaves * octaves);
    },
  };
}
