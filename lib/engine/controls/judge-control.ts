import type { ControlSpec, NullNumbers } from '@/lib/engine/readout/types';

/** A control's outcome with the sentence that says why. */
export interface Judgement {
  outcome: 'survives' | 'fails' | 'cannotTell';
  sentence: string;
}

const ALPHA = 0.05;
const show = (value: number): string => value.toFixed(3).replace('-', '−');

/**
 * Judges a control that was read out once over the readout's own kind of folds.
 *
 * Two kinds of questions. Could something else explain the readout (nuisance only, total rate, trial order, another
 * window): the readout survives when that something cannot be told from chance. Is the label still there (incremental,
 * adjusted, rate-normalised, correlations broken): it survives when R² > 0 with p ≤ .05 in the control's own shuffled control.
 *
 * `r2`, `control`: the control's held-out R² and null; `mainR2`, `mainP`: the readout's own.
 */
export function judgeControl(
  kind: ControlSpec['kind'],
  r2: number | null,
  control: NullNumbers | null,
  mainR2: number | null,
  mainP: number | null,
): Judgement {
  if (r2 === null)
    return { outcome: 'cannotTell', sentence: 'The held-out R² of this control cannot be worked out.' };
  if (control === null || control.p === null) {
    return {
      outcome: 'cannotTell',
      sentence: `Held-out R² ${show(r2)}; without a shuffled control it cannot be told from chance.`,
    };
  }
  if (control.smallestP !== null && control.smallestP > ALPHA) {
    return {
      outcome: 'cannotTell',
      sentence: `Held-out R² ${show(r2)}; the smallest p that ${control.draws} draws of this scheme can give is ${show(control.smallestP)}.`,
    };
  }
  const told = `held-out R² ${show(r2)}, p ${show(control.p)}`;
  const isAbove = control.p <= ALPHA;
  switch (kind) {
    case 'nuisanceOnly':
    case 'totalRate':
    case 'trialOrder':
      return judgeRival(nameOf(kind), told, isAbove, r2, mainR2, mainP);
    case 'window':
      return isAbove
        ? { outcome: 'fails', sentence: `The label is read out in the control window too (${told}).` }
        : { outcome: 'survives', sentence: `Nothing is read out in the control window (${told}).` };
    default:
      if (isAbove && r2 > 0) return { outcome: 'survives', sentence: `${stillThere(kind)} (${told}).` };
      if (isAbove) {
        return {
          outcome: 'cannotTell',
          sentence: `Better than its shuffled control, yet not than its baseline (${told}).`,
        };
      }
      return { outcome: 'fails', sentence: `${notThere(kind)} (${told}).` };
  }
}

function judgeRival(
  name: string,
  told: string,
  isAbove: boolean,
  r2: number,
  mainR2: number | null,
  mainP: number | null,
): Judgement {
  if (!isAbove) return { outcome: 'survives', sentence: `${name} cannot predict the label (${told}).` };
  if (mainR2 === null || mainP === null || mainP > ALPHA) {
    return {
      outcome: 'cannotTell',
      sentence: `${name} predicts the label (${told}); the readout itself is not above chance.`,
    };
  }
  if (r2 >= mainR2) {
    return {
      outcome: 'fails',
      sentence: `${name} predicts the label as well as the units do (${told}; units ${show(mainR2)}).`,
    };
  }
  return {
    outcome: 'cannotTell',
    sentence: `${name} predicts the label in part (${told}; units ${show(mainR2)}): ask what the units add to it.`,
  };
}

function nameOf(kind: 'nuisanceOnly' | 'totalRate' | 'trialOrder'): string {
  if (kind === 'nuisanceOnly') return 'The nuisance alone';
  return kind === 'totalRate' ? 'The summed rate alone' : 'Trial order alone';
}

function stillThere(kind: ControlSpec['kind']): string {
  switch (kind) {
    case 'incremental':
      return 'The units add to what the nuisance predicts';
    case 'adjusted':
      return 'The label is still read out with the nuisance taken out';
    case 'rateNormalised':
      return 'The label is still read out from rate-normalised counts';
    case 'matched':
      return 'The label is still read out from matched trials';
    case 'generalise':
      return 'The readout carries over';
    default:
      return 'The label is still read out';
  }
}

function notThere(kind: ControlSpec['kind']): string {
  switch (kind) {
    case 'incremental':
      return 'The units add nothing that can be told from chance';
    case 'adjusted':
      return 'With the nuisance taken out nothing is left that can be told from chance';
    case 'generalise':
      return 'The readout does not carry over';
    default:
      return 'The label is not read out any more';
  }
}
