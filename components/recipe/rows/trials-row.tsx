'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import { conditionWords } from '@/components/recipe/condition-words';
import { RadioWords } from '@/components/recipe/radio-words';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RowProps } from '@/components/recipe/rows/row-props';
import { TypedField } from '@/components/recipe/typed-field';
import { formatPlural } from '@/lib/format/format-plural';

const ops = [
  { value: '=', text: 'is' },
  { value: '!=', text: 'is not' },
  { value: '<', text: 'is below' },
  { value: '<=', text: 'is at most' },
  { value: '>', text: 'is above' },
  { value: '>=', text: 'is at least' },
] as const;

/** Which trials are used. Exclusions of the session always hold. */
export function TrialsRow({ form, set, facts, checks, faultOf }: RowProps) {
  const column = facts.trialColumns.find((candidate) => candidate.name === form.trialColumn);
  const isName = column?.type === 'category';
  const levels = isName
    ? [...new Set(column.values.filter((value) => value !== null))].map(String).sort()
    : [];
  const kept = form.from?.trials;
  const out = facts.excludedTrials.length;
  return (
    <RecipeRow
      id="trials"
      term="Trials"
      because={
        out === 0
          ? 'No trial of the session is left out.'
          : `${formatPlural(out, 'trial')} left out on the session’s page stay out.`
      }
      checks={checks}
    >
      <RadioWords
        name="trials"
        legend="Trials"
        value={form.trials}
        options={[
          { value: 'all', text: 'all that are in' },
          { value: 'where', text: 'those where' },
          ...(form.trials === 'kept' ||
          (kept && !('all' in kept) && !('where' in kept && kept.where.length === 1))
            ? [{ value: 'kept' as const, text: 'as in the repeated readout' }]
            : []),
        ]}
        onChange={(trials) => set({ trials })}
      />
      {form.trials === 'where' && (
        <div className="inline">
          <ChoiceField
            label="Column"
            value={form.trialColumn}
            options={facts.trialColumns
              .filter((candidate) => candidate.name !== form.label)
              .map(({ name }) => ({ value: name, text: name }))}
            onChange={(trialColumn) => set({ trialColumn, trialValue: '' })}
          />
          <ChoiceField
            label="Comparison"
            value={form.trialOp}
            options={isName ? ops.slice(0, 2) : ops}
            onChange={(trialOp) => set({ trialOp })}
          />
          {isName ? (
            <ChoiceField
              label="Value"
              value={form.trialValue}
              options={[
                { value: '', text: 'choose' },
                ...levels.map((level) => ({ value: level, text: level })),
              ]}
              onChange={(trialValue) => set({ trialValue })}
            />
          ) : (
            <TypedField
              label="Value"
              value={form.trialValue}
              error={faultOf('trialValue')}
              onChange={(trialValue) => set({ trialValue })}
            />
          )}
        </div>
      )}
      {form.trials === 'kept' && kept && (
        <p className="say">
          {'where' in kept
            ? kept.where.map(conditionWords).join(', ')
            : 'ids' in kept
              ? `a list of ${kept.ids.length}`
              : ''}
        </p>
      )}
    </RecipeRow>
  );
}
