'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import { RadioWords } from '@/components/recipe/radio-words';
import type { PenaltyChoice } from '@/components/recipe/recipe-form-state';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RowProps } from '@/components/recipe/rows/row-props';
import { TypedField } from '@/components/recipe/typed-field';

const because = {
  leastSquares: 'No penalty: only where trials are many times the features.',
  ridge: 'A penalty, because units are correlated and trials are few.',
  pcr: 'Regression on the directions of largest variance.',
  pls: 'Regression on the directions that go most with the label, found on training trials.',
} as const;

/** The linear readout and how its penalty or number of components is come by. */
export function EstimatorRow({ form, set, checks, faultOf }: RowProps) {
  const isRidge = form.estimator === 'ridge';
  const choices: { value: PenaltyChoice; text: string }[] = [
    ...(isRidge
      ? [
          { value: 'leaveOneOut' as const, text: 'leave-one-out' },
          { value: 'gcv' as const, text: 'generalised cross-validation' },
        ]
      : []),
    { value: 'innerFolds', text: 'inner folds' },
    { value: 'value', text: 'a fixed value' },
  ];
  return (
    <RecipeRow id="estimator" term="Estimator" because={because[form.estimator]} checks={checks}>
      <RadioWords
        name="estimator"
        legend="Estimator"
        value={form.estimator}
        options={[
          { value: 'leastSquares', text: 'least squares' },
          { value: 'ridge', text: 'ridge' },
          { value: 'pcr', text: 'principal components' },
          { value: 'pls', text: 'partial least squares' },
        ]}
        onChange={(estimator) =>
          set({
            estimator,
            choose:
              estimator !== 'ridge' && (form.choose === 'leaveOneOut' || form.choose === 'gcv')
                ? 'innerFolds'
                : form.choose,
          })
        }
      />
      {form.estimator !== 'leastSquares' && (
        <div className="inline">
          <span>{isRidge ? 'penalty by' : 'components by'}</span>
          <ChoiceField
            label={isRidge ? 'Penalty' : 'Components'}
            value={form.choose}
            options={choices}
            onChange={(choose) => set({ choose })}
          />
          {form.choose === 'value' && (
            <TypedField
              label={isRidge ? 'Penalty λ' : 'Number of components'}
              value={form.value}
              error={faultOf('value')}
              onChange={(value) => set({ value })}
            />
          )}
          {form.choose === 'innerFolds' && (
            <TypedField
              label="Inner folds"
              value={form.innerFolds}
              error={faultOf('innerFolds')}
              onChange={(innerFolds) => set({ innerFolds })}
            />
          )}
          {isRidge && form.choose !== 'value' && (
            <>
              <span>over</span>
              <ChoiceField
                label="Grid of penalties"
                value={form.grid}
                options={[
                  {
                    value: 'default',
                    text: '25 values, 0.0001 to 10 000 times the larger of trials and features',
                  },
                  { value: 'own', text: 'a grid of my own' },
                ]}
                onChange={(grid) => set({ grid })}
              />
              {form.grid === 'own' && (
                <>
                  <TypedField
                    label="Number of penalties"
                    value={form.gridCount}
                    error={faultOf('gridCount')}
                    onChange={(gridCount) => set({ gridCount })}
                  />
                  <span>values from</span>
                  <TypedField
                    label="Smallest penalty"
                    value={form.gridFrom}
                    error={faultOf('gridFrom')}
                    onChange={(gridFrom) => set({ gridFrom })}
                  />
                  <span>to</span>
                  <TypedField
                    label="Largest penalty"
                    value={form.gridTo}
                    error={faultOf('gridTo')}
                    onChange={(gridTo) => set({ gridTo })}
                  />
                </>
              )}
            </>
          )}
          {!isRidge && form.choose !== 'value' && (
            <>
              <span>at most</span>
              <TypedField
                label="Largest number of components, or empty"
                value={form.maxComponents}
                error={faultOf('maxComponents')}
                onChange={(maxComponents) => set({ maxComponents })}
              />
              <span className="quiet">(empty: as many as fit)</span>
            </>
          )}
        </div>
      )}
    </RecipeRow>
  );
}
