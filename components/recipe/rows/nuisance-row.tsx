'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import { RadioWords } from '@/components/recipe/radio-words';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RowProps } from '@/components/recipe/rows/row-props';
import type { NuisanceColumn } from '@/lib/contracts/recipe';

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
  const toggle = (name: string, type: string): void => {
    const next = { ...form.nuisance };
    if (name in next) delete next[name];
    else next[name] = type === 'category' ? 'category' : 'linear';
    set({ nuisance: next, handling: Object.keys(next).length > 0 ? 'adjust' : 'none' });
  };
  return (
    <RecipeRow
      id="nuisance"
      term="Nuisances"
      because="Columns of this session’s trial table. Taken out of rates and label by coefficients of the training trials alone; a badly measured nuisance leaves a residue."
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
                    onChange={(next) => set({ nuisance: { ...form.nuisance, [name]: next } })}
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
              { value: 'adjust', text: 'taken out of units and label first' },
              { value: 'none', text: 'only named' },
            ]}
            onChange={(handling) => set({ handling })}
          />
        </>
      )}
    </RecipeRow>
  );
}
