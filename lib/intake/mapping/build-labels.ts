import type { LabelSource } from '@/lib/contracts/intake';
import type { Problem } from '@/lib/contracts/problem';
import type { Column } from '@/lib/intake/column';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { fromStimulus } from '@/lib/intake/mapping/label-from-stimulus';
import { fromStrengths } from '@/lib/intake/mapping/label-from-strengths';
import type { LabelChoice, StimulusVelocity } from '@/lib/intake/session-data';

/**
 * The labels that the mapping names. A label from strengths, λ_shared² / (λ_shared² + λ_own²), or from the stimulus (the
 * realised fraction of each trial, with its 95 % interval in two columns beside it) becomes new trial columns; trials in
 * which nothing moves have none.
 * @returns the trial columns with any new ones, the labels, and remarks on how they were made
 */
export function buildLabels(
  sources: readonly LabelSource[],
  trials: readonly Column[],
  stimulus: StimulusVelocity | undefined,
): { trials: Column[]; labels: LabelChoice[]; remarks: Problem[] } {
  const columns = [...trials];
  const labels: LabelChoice[] = [];
  const remarks: Problem[] = [];
  const numbers = (name: string): Float64Array => {
    const column = columns.find((one) => one.name === name);
    const place = { path: name };
    if (column === undefined)
      throw new IntakeRefusal(
        'label-not-found',
        `The trial table has no column “${name}”.`,
        'Choose one of its columns as the label.',
        place,
      );
    if (column.type === 'category')
      throw new IntakeRefusal(
        'label-category',
        `“${name}” is a category; only continuous labels can be read out.`,
        'Choose a column of numbers.',
        place,
      );
    if (column.type === 'circular')
      throw new IntakeRefusal(
        'label-circular',
        `“${name}” is circular; a linear readout needs a label on a line.`,
        'Choose another column, or send its cosine or sine as a column.',
        place,
      );
    return column.values;
  };
  const add = (name: string, values: Float64Array): void => {
    if (columns.some((one) => one.name === name))
      throw new IntakeRefusal(
        'label-name',
        `There is already a trial column “${name}”.`,
        'Give the label another name.',
        { path: name },
      );
    columns.push({ name, type: 'number', values });
  };
  for (const source of sources) {
    if ('column' in source) {
      numbers(source.column);
      labels.push({ column: source.column, kind: source.kind });
    } else if ('fromStrengths' in source) {
      const shared = numbers(source.fromStrengths.shared);
      const own = numbers(source.fromStrengths.own);
      add(
        source.name,
        Float64Array.from(fromStrengths(shared, own), (value) => value ?? NaN),
      );
      labels.push({ column: source.name, kind: 'nominal', made: { from: 'strengths' } });
    } else {
      if (stimulus === undefined)
        throw new IntakeRefusal(
          'label-stimulus',
          `The label “${source.name}” is to be worked out from the stimulus, and the mapping names none.`,
          'Name the array of velocities, or choose a column of the trial table as the label.',
        );
      const { centring, clip } = source.fromStimulus;
      const made = fromStimulus(stimulus, trials[0].values.length, centring);
      const held = (value: number): number => (clip ? Math.min(1, Math.max(0, value)) : value);
      add(source.name, made.fraction.map(held));
      add(`${source.name}_low`, made.low);
      add(`${source.name}_high`, made.high);
      labels.push({
        column: source.name,
        kind: 'realised',
        made: { from: 'stimulus', centring, isClipped: clip, pooled: made.pooled },
      });
      remarks.push({
        code: 'label-made',
        severity: 'notes',
        message: `The label “${source.name}” was worked out from the stimulus with the centring “${centring}”${clip ? ', clipped to 0 to 1' : ''}; over all trials the shared part is ${made.pooled === null ? 'not known' : made.pooled.toFixed(3)}.`,
        remedy: 'Its interval in each trial stands in the columns beside it.',
        place: { path: source.name },
      });
    }
  }
  const names = labels.map((label) => label.column);
  const twice = names.find((name, at) => names.indexOf(name) !== at);
  if (twice !== undefined)
    throw new IntakeRefusal('label-twice', `“${twice}” is named as a label twice.`, 'Name it once.', {
      path: twice,
    });
  return { trials: columns, labels, remarks };
}
