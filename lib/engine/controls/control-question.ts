import type { ControlSpec } from '@/lib/engine/readout/types';

const names = (control: { columns: { name: string }[] }): string =>
  control.columns.map(({ name }) => name).join(', ');

/** The question that a control asks of a readout of `label`, in words. */
export function controlQuestion(control: ControlSpec, label: string): string {
  switch (control.kind) {
    case 'nuisanceOnly':
      return `Can ${names(control)} alone predict “${label}” in held-out trials?`;
    case 'incremental':
      return `Do the units say anything about “${label}” beyond ${names(control)}?`;
    case 'adjusted':
      return `Is “${label}” still read out when ${names(control)} is taken out of the units and of the label?`;
    case 'totalRate':
      return `Is the summed rate of the units enough to read out “${label}”?`;
    case 'rateNormalised':
      return `Is “${label}” still read out when each trial's counts are divided by their sum?`;
    case 'trialOrder':
      return `Can the trial's number in the session alone predict “${label}”?`;
    case 'window':
      return `Is “${label}” read out from ${control.startMs} to ${control.endMs} ms, where it should not be?`;
    case 'matched':
      return `Is “${label}” still read out from trials in which it is balanced over ${control.column}?`;
    case 'breakCorrelations':
      return control.scope === 'train'
        ? `Does a readout that was trained without correlations between units still read out “${label}”?`
        : `Is “${label}” still read out when correlations between units are broken everywhere?`;
    case 'generalise':
      return `Does a readout trained at ${control.column} = ${control.trainNames.join(', ')} read out “${label}” at ${control.testNames.join(', ')}?`;
    case 'injection':
      return 'How strong must a signal be for these trials to show it?';
  }
}
