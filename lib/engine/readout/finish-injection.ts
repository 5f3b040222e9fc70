import type { CollectedOutputs } from '@/lib/engine/readout/collected-outputs';
import type { ControlNumbers, ControlSpec, ReadoutInput, ReadoutPlan } from '@/lib/engine/readout/types';

const ALPHA = 0.05;
const WANTED_POWER = 0.8;

/** Power at one size of injected signal. */
export interface InjectedSize {
  size: number;
  populationR2: number;
  draws: number;
  detected: number;
  power: number;
  meanR2: number;
}

/**
 * Power of the readout's shuffled control (p ≤ .05) at each size of injected signal, and the smallest size that is found in
 * 80 % of the sessions made: the least that these trials would show.
 */
export function finishInjection(
  input: ReadoutInput,
  plan: ReadoutPlan,
  outputs: CollectedOutputs,
  control: ControlSpec & { kind: 'injection' },
  index: number,
): Omit<ControlNumbers, 'kind' | 'question'> {
  const powers = control.sizes.map((size, at): InjectedSize => {
    let detected = 0;
    let sum = 0;
    let populationR2 = 0;
    for (let draw = 0; draw < control.draws; draw++) {
      const values = outputs.of({ kind: 'injection', control: index, size: at, draw });
      const exceedances = outputs.number(values, 'exceedances') ?? 0;
      const draws = outputs.number(values, 'draws') ?? 0;
      if ((exceedances + 1) / (draws + 1) <= ALPHA) detected++;
      sum += outputs.number(values, 'r2') ?? 0;
      populationR2 = outputs.number(values, 'populationR2') ?? 0;
    }
    const power = detected / control.draws;
    return { size, populationR2, draws: control.draws, detected, power, meanR2: sum / control.draws };
  });
  const n = plan.foldSets[0].trials.length;
  const found = [...powers].sort((a, b) => a.size - b.size).find(({ power }) => power >= WANTED_POWER);
  const heldOut = { nTrials: n, nUnits: input.unitIndex.length };
  if (found === undefined) {
    const best = Math.max(...powers.map(({ power }) => power));
    return {
      heldOut,
      null: null,
      outcome: 'cannotTell',
      sentence: `No injected size is found in 80 % of sessions; the best is found in ${Math.round(100 * best)} %. A readout that fails here says little.`,
      detail: { powers, smallestDetectable: null },
    };
  }
  return {
    heldOut,
    null: null,
    outcome: 'survives',
    sentence: `A signal with a population R² of ${found.size} is found in ${Math.round(100 * found.power)} % of ${found.draws} sessions with these ${n} trials.`,
    detail: { powers, smallestDetectable: found.size },
  };
}
