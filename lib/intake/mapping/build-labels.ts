import type { LabelSource } from '@/lib/contracts/intake';
import type { Column } from '@/lib/intake/column';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { LabelChoice } from '@/lib/intake/session-data';

/**
 * The labels that the mapping names. A label from strengths, λ_shared² / (λ_shared² + λ_own²), becomes a new trial column.
 * @returns the trial columns with any new ones, and the labels
 */
export function buildLabels(
  sources: readonly LabelSource[],
  trials: readonly Column[],
): { trials: Column[]; labels: LabelChoice[] } {
  const columns = [...trials];
  const labels: LabelChoice[] = [];
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
        shared.map((strength, trial) => strength ** 2 / (strength ** 2 + own[trial] ** 2)),
      );
      labels.push({ column: source.name, kind: 'nominal' });
    } else
      throw new IntakeRefusal(
        'label-stimulus',
        `The label “${source.name}” asks for a stimulus.`,
        'Choose a column of the trial table as the label.',
      );
  }
  const names = labels.map((label) => label.column);
  const twice = names.find((name, at) => names.indexOf(name) !== at);
  if (twice !== undefined)
    throw new IntakeRefusal('label-twice', `“${twice}” is named as a label twice.`, 'Name it once.', {
      path: twice,
    });
  return { trials: columns, labels };
}
