'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import { FoldPreview } from '@/components/recipe/fold-preview';
import { foldsWords } from '@/components/recipe/folds-words';
import { RadioWords } from '@/components/recipe/radio-words';
import { readTypedNumber } from '@/components/recipe/read-typed-number';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RowProps } from '@/components/recipe/rows/row-props';
import { TypedField } from '@/components/recipe/typed-field';

/** Which trials are held out together. */
export function FoldsRow({ form, set, facts, checks, faultOf, why }: RowProps & { why: string }) {
  const columns = facts.trialColumns
    .filter((column) => column.name !== form.label)
    .map(({ name }) => ({ value: name, text: name }));
  const groups = facts.trialColumns.find((column) => column.name === form.groupColumn)?.values ?? null;
  return (
    <RecipeRow id="folds" term="Folds" because={why} checks={checks}>
      <RadioWords
        name="folds"
        legend="Folds"
        value={form.folds}
        options={[
          { value: 'contiguous', text: 'contiguous' },
          { value: 'stratified', text: 'random, by level' },
          ...(columns.length > 0
            ? [{ value: 'leaveOneGroupOut' as const, text: 'leave one group out' }]
            : []),
          ...(form.from?.folds.kind === 'given' ? [{ value: 'kept' as const, text: 'as given' }] : []),
        ]}
        onChange={(folds) => set({ folds })}
      />
      {(form.folds === 'contiguous' || form.folds === 'stratified') && (
        <div className="inline">
          <span>folds</span>
          <TypedField
            label="Number of folds"
            value={form.k}
            error={faultOf('k')}
            onChange={(k) => set({ k })}
          />
          {form.folds === 'contiguous' ? (
            <>
              <span>purge gap</span>
              <TypedField
                label="Purge gap, trials"
                value={form.purge}
                error={faultOf('purge')}
                onChange={(purge) => set({ purge })}
              />
              <span>trials</span>
            </>
          ) : (
            <>
              <span>repeats</span>
              <TypedField
                label="Repeats with new folds"
                value={form.repeats}
                error={faultOf('repeats')}
                onChange={(repeats) => set({ repeats })}
              />
            </>
          )}
        </div>
      )}
      {form.folds === 'leaveOneGroupOut' && (
        <div className="inline">
          <span>each value of</span>
          <ChoiceField
            label="Group column"
            value={form.groupColumn}
            options={columns}
            onChange={(groupColumn) => set({ groupColumn })}
          />
          <span>is held out once</span>
        </div>
      )}
      {form.folds === 'kept' && form.from ? (
        <p className="say">{foldsWords(form.from.folds)}</p>
      ) : (
        form.folds !== 'kept' && (
          <FoldPreview
            kind={form.folds}
            k={readTypedNumber(form.k) ?? 0}
            purgeTrials={readTypedNumber(form.purge) ?? 0}
            nTrials={facts.nTrials}
            groups={form.folds === 'leaveOneGroupOut' ? groups : null}
          />
        )
      )}
    </RecipeRow>
  );
}
