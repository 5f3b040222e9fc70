'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RowProps } from '@/components/recipe/rows/row-props';

const kinds = {
  nominal: 'Nominal: the value that was designed, not what the trial showed.',
  realised: 'Realised: worked out from that trial’s stimulus.',
  other: 'A continuous trial variable.',
} as const;

/** Which trial variable is read out. */
export function LabelRow({ form, set, facts, checks }: RowProps) {
  const kind = facts.labels.find((label) => label.column === form.label)?.kind ?? 'other';
  return (
    <RecipeRow id="label" term="Label" because={kinds[kind]} checks={checks}>
      <div className="inline" style={{ marginTop: 0 }}>
        <ChoiceField
          label="Label"
          value={form.label}
          options={facts.labels.map((label) => ({
            value: label.column,
            text: label.kind === 'other' ? label.column : `${label.column}, ${label.kind}`,
          }))}
          onChange={(label) => set({ label })}
        />
        <span>as</span>
        <ChoiceField
          label="Transform of the label"
          value={form.labelTransform}
          options={[
            { value: 'none', text: 'it is' },
            { value: 'log', text: 'its logarithm' },
            { value: 'logit', text: 'its logit' },
          ]}
          onChange={(labelTransform) => set({ labelTransform })}
        />
      </div>
    </RecipeRow>
  );
}
