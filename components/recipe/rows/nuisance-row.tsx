'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import { RadioWords } from '@/components/recipe/radio-words';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RecipeFormState } from '@/components/recipe/recipe-form-state';
import type { RowProps } from '@/components/recipe/rows/row-props';
import type { ControlRecipe, NuisanceColumn } from '@/lib/contracts/recipe';

const terms: { value: NuisanceColumn['term']; text: string }[] = [
  { value: 'linear', text: 'linear' },
  { value: 'quadratic', text: 'quadratic' },
  { value: 'spline', text: 'spline, 4 df' },
  { value: 'category', text: 'category' },
];

/** Trial variables that could explain a readout, and whether they are taken out first. */
export function NuisanceRow({ form, set, facts, checks }: RowProps) {
  const labels = new Set(facts.labels.map((label) => label.column));
  const columns = facts.trialColumns.filter(
    (column) => column.name !== form.label && !labels.has(column.name),
  );
  if (columns.length === 0) return null;
  const chosen = Object.keys(form.nuisance).length > 0;
  const change = (next: RecipeFormState['nuisance']): void => {
    const list = Object.entries(next).map(([column, term]) => ({ column, term }));
    set({
      nuisance: next,
      handling: list.length > 0 ? form.handling : 'none',
      // Controls that ask about nuisances ask about these; without any they have no question.
      controls: form.controls.flatMap((control): ControlRecipe[] =>
        !('columns' in control) ? [control] : list.length > 0 ? [{ ...control, columns: list }] : [],
      ),
    });
  };
  const toggle = (name: string, type: string): void => {
    const { [name]: old, ...rest } = form.nuisance;
    change(old === undefined ? { ...rest, [name]: type === 'category' ? 'category' : 'linear' } : rest);
  };
  return (
    <RecipeRow
      id="nuisance"
      term="Nuisances"
      because="Columns of this session’s trial table. Whatever is done with them uses coefficients of the training trials alone; a badly measured nuisance leaves a residue."
      checks={checks}
    >
      <div className="opts">
        {columns.map((column) => (
          <label key={column.name}>
            <input
              type="checkbox"
              checked={column.name in form.nuisance}
              onChange={() => toggle(column.name, column.type)}
            />
            {column.name}
          </label>
        ))}
      </div>
      {chosen && (
        <>
          <div className="inline">
            {Object.entries(form.nuisance).map(([name, term]) => {
              const isName = facts.trialColumns.find((column) => column.name === name)?.type === 'category';
              return (
                <span key={name} style={{ display: 'inline-flex', gap: 8, alignItems: 'center' }}>
                  {name}
                  <ChoiceField
                    label={`Term of ${name}`}
                    value={term}
                    options={isName ? terms.slice(3) : terms}
                    onChange={(next) => change({ ...form.nuisance, [name]: next })}
                  />
                </span>
              );
            })}
          </div>
          <RadioWords
            name="handling"
            legend="What is done with the nuisances"
            value={form.handling}
            options={[
              { value: 'none', text: 'only in the controls' },
              { value: 'adjust', text: 'taken out of units and label first' },
            ]}
            onChange={(handling) => set({ handling })}
          />
        </>
      )}
    </RecipeRow>
  );
}
