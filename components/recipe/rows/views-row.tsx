'use client';
import { NumberListField } from '@/components/recipe/number-list-field';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RowProps } from '@/components/recipe/rows/row-props';
import type { ViewRecipe } from '@/lib/contracts/recipe';

type Kind = ViewRecipe['kind'];

const words: Record<Kind, string> = {
  timeCourse: 'Time course, corrected',
  temporalGeneralisation: 'Window against window',
  populationSize: 'Number of units',
  learning: 'Number of training trials',
  weights: 'Weights beside patterns',
  singleUnits: 'Single units',
};

function doublings(most: number, from = 1): number[] {
  const sizes: number[] = [];
  for (let size = from; size <= most; size *= 2) sizes.push(size);
  return sizes;
}

/** What else is drawn of the same readout, with the same folds and draws. */
export function ViewsRow({ form, set, facts, checks }: RowProps) {
  const { binWidthMs, nBins } = facts;
  const nUnits = facts.units.length - facts.excludedUnits.length;
  const width = Math.min(nBins, Math.max(1, Math.round(100 / binWidthMs))) * binWidthMs;
  const training = Math.floor((facts.nTrials - facts.excludedTrials.length) * 0.75);
  const first = (kind: Kind): ViewRecipe | null => {
    switch (kind) {
      case 'timeCourse':
        return nBins < 2
          ? null
          : { kind, widthMs: width, stepMs: Math.max(1, Math.round(width / binWidthMs / 4)) * binWidthMs };
      case 'temporalGeneralisation':
        return nBins < 2
          ? null
          : { kind, widthMs: width, stepMs: Math.max(1, Math.round(width / binWidthMs / 2)) * binWidthMs };
      case 'populationSize':
        return { kind, sizes: doublings(nUnits), draws: 12 };
      case 'learning':
        return training < 25 ? null : { kind, sizes: doublings(training, 25), draws: 8 };
      default:
        return { kind };
    }
  };
  const change = (kind: Kind, next: ViewRecipe): void =>
    set({ views: form.views.map((view) => (view.kind === kind ? next : view)) });
  const fields = (view: ViewRecipe) => {
    switch (view.kind) {
      case 'timeCourse':
      case 'temporalGeneralisation':
        return (
          <>
            <span>windows of</span>
            <NumberListField
              label="Width of the windows, ms"
              values={[view.widthMs]}
              onChange={([widthMs]) => change(view.kind, { ...view, widthMs })}
            />
            <span>ms, step</span>
            <NumberListField
              label="Step of the windows, ms"
              values={[view.stepMs]}
              onChange={([stepMs]) => change(view.kind, { ...view, stepMs })}
            />
            <span>ms</span>
          </>
        );
      case 'populationSize':
      case 'learning':
        return (
          <>
            <NumberListField
              label="Sizes"
              values={view.sizes}
              isList
              onChange={(sizes) => change(view.kind, { ...view, sizes })}
            />
            <span>draws</span>
            <NumberListField
              label="Draws per size"
              values={[view.draws]}
              onChange={([draws]) => change(view.kind, { ...view, draws })}
            />
          </>
        );
      default:
        return null;
    }
  };
  return (
    <RecipeRow
      id="views"
      term="Views"
      because="The same readout seen over time, over sizes and unit by unit: same folds, same shuffles. None runs unless you ask for it."
      checks={checks}
    >
      <ul>
        {(Object.keys(words) as Kind[]).map((kind) => {
          const present = form.views.filter((view) => view.kind === kind);
          const made = first(kind);
          if (present.length === 0 && made === null) return null;
          return (
            <li key={kind} className="opts" style={{ minHeight: 30 }}>
              <label>
                <input
                  type="checkbox"
                  checked={present.length > 0}
                  onChange={() =>
                    set({
                      views:
                        present.length > 0
                          ? form.views.filter((view) => view.kind !== kind)
                          : made
                            ? [...form.views, made]
                            : form.views,
                    })
                  }
                />
                {words[kind]}
                {present.length > 1 && (
                  <span className="quiet"> ({present.length} of them, as in the repeated readout)</span>
                )}
              </label>
              {present.length === 1 && (
                <span className="inline" style={{ marginTop: 0 }}>
                  {fields(present[0])}
                </span>
              )}
            </li>
          );
        })}
      </ul>
    </RecipeRow>
  );
}
