'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import { RadioWords } from '@/components/recipe/radio-words';
import { readTypedNumber } from '@/components/recipe/read-typed-number';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RowProps } from '@/components/recipe/rows/row-props';
import { TypedField } from '@/components/recipe/typed-field';
import { numbers } from '@/components/ui/numbers';
import { formatP } from '@/lib/format/format-p';

/** How labels are shuffled for the control against chance. */
export function NullRow({ form, set, facts, checks, faultOf, why }: RowProps & { why: string }) {
  const columns = facts.trialColumns
    .filter((column) => column.name !== form.label)
    .map(({ name }) => ({ value: name, text: name }));
  const draws = readTypedNumber(form.draws);
  const byColumn = form.null === 'within' || form.null === 'groups';
  const keeps = form.from?.null.kind === 'given' || form.from?.null.kind === 'sessions';
  return (
    <RecipeRow id="null" term="Shuffled control" because={why} checks={checks}>
      <RadioWords
        name="null"
        legend="Shuffled control"
        value={form.null}
        options={[
          { value: 'free', text: 'free' },
          ...(columns.length > 0
            ? [
                { value: 'within' as const, text: 'within' },
                { value: 'groups' as const, text: 'whole groups' },
              ]
            : []),
          { value: 'circularShift', text: 'circular shift' },
          { value: 'none', text: 'none' },
          ...(keeps ? [{ value: 'kept' as const, text: 'as in the repeated readout' }] : []),
        ]}
        onChange={(scheme) => set({ null: scheme })}
      />
      {form.null !== 'none' && form.null !== 'kept' && (
        <div className="inline">
          {byColumn && (
            <>
              <span>{form.null === 'within' ? 'labels shuffled within' : 'groups of'}</span>
              <ChoiceField
                label="Trial column"
                value={form.nullColumn}
                options={columns}
                onChange={(nullColumn) => set({ nullColumn })}
              />
            </>
          )}
          <span>draws</span>
          <TypedField
            label="Draws"
            value={form.draws}
            error={faultOf('draws')}
            onChange={(next) => set({ draws: next })}
          />
          {draws !== null && draws >= 1 && (
            <span className="quiet">{numbers(`least p ${formatP(1 / (draws + 1))}`)}</span>
          )}
        </div>
      )}
    </RecipeRow>
  );
}
