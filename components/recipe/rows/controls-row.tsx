'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import { NumberListField } from '@/components/recipe/number-list-field';
import { RecipeRow } from '@/components/recipe/recipe-row';
import { GeneraliseLevels } from '@/components/recipe/rows/generalise-levels';
import type { RowProps } from '@/components/recipe/rows/row-props';
import type { ControlRecipe } from '@/lib/contracts/recipe';

type Kind = ControlRecipe['kind'];

const words: Record<Kind, string> = {
  window: 'Before the event',
  nuisanceOnly: 'Nuisances alone',
  incremental: 'What the units add to the nuisances',
  adjusted: 'Nuisances taken out of units and label',
  totalRate: 'Total rate alone',
  trialOrder: 'Trial order alone',
  rateNormalised: 'Rates divided by the total',
  matched: 'Trials matched on a nuisance',
  breakCorrelations: 'Correlations broken',
  generalise: 'Other levels of a column',
  injection: 'Least signal that would show',
};

/** The controls that ask why; each says in words whether the readout survives it. */
export function ControlsRow({ form, set, facts, checks }: RowProps) {
  const nuisances = Object.entries(form.nuisance).map(([column, term]) => ({ column, term }));
  const labels = new Set(facts.labels.map((label) => label.column));
  const columns = facts.trialColumns.filter((column) => !labels.has(column.name));
  const few = columns.filter((column) => {
    const distinct = new Set(column.values.filter((value) => value !== null)).size;
    return distinct >= 2 && distinct <= 12;
  });
  const before = Math.min(facts.nBins, Math.floor(-facts.windowStartMs / facts.binWidthMs + 1e-9));
  const first = (kind: Kind): ControlRecipe | null => {
    switch (kind) {
      case 'window':
        return before < 1
          ? null
          : { kind, startMs: facts.windowStartMs, endMs: facts.windowStartMs + before * facts.binWidthMs };
      case 'nuisanceOnly':
      case 'incremental':
      case 'adjusted':
        return nuisances.length === 0 ? null : { kind, columns: nuisances };
      case 'matched':
        return columns.length === 0
          ? null
          : { kind, column: nuisances[0]?.column ?? columns[0].name, draws: 20 };
      case 'breakCorrelations':
        return { kind, scope: 'train' };
      case 'generalise': {
        if (few.length === 0) return null;
        const levels = [...new Set(few[0].values.filter((value) => value !== null))];
        return { kind, column: few[0].name, train: levels.slice(0, -1), test: levels.slice(-1) };
      }
      case 'injection':
        return { kind, sizes: [0.02, 0.05, 0.1], draws: 20 };
      default:
        return { kind };
    }
  };
  const change = (kind: Kind, next: ControlRecipe): void =>
    set({ controls: form.controls.map((control) => (control.kind === kind ? next : control)) });
  const fields = (control: ControlRecipe) => {
    switch (control.kind) {
      case 'window':
        return (
          <>
            <NumberListField
              label="Start of the control window, ms"
              values={[control.startMs]}
              onChange={([startMs]) => change('window', { ...control, startMs })}
            />
            <span>to</span>
            <NumberListField
              label="End of the control window, ms"
              values={[control.endMs]}
              onChange={([endMs]) => change('window', { ...control, endMs })}
            />
            <span>ms</span>
          </>
        );
      case 'matched':
        return (
          <>
            <ChoiceField
              label="Nuisance to match"
              value={control.column}
              options={columns.map(({ name }) => ({ value: name, text: name }))}
              onChange={(column) => change('matched', { ...control, column })}
            />
            <NumberListField
              label="Matched draws"
              values={[control.draws]}
              onChange={([draws]) => change('matched', { ...control, draws })}
            />
            <span>draws, at least 20</span>
          </>
        );
      case 'breakCorrelations':
        return (
          <ChoiceField
            label="Where correlations are broken"
            value={control.scope}
            options={[
              { value: 'train', text: 'in training trials only' },
              { value: 'all', text: 'everywhere' },
            ]}
            onChange={(scope) => change('breakCorrelations', { ...control, scope })}
          />
        );
      case 'generalise':
        return (
          <GeneraliseLevels control={control} columns={few} onChange={(next) => change('generalise', next)} />
        );
      case 'injection':
        return (
          <>
            <span>population R²</span>
            <NumberListField
              label="Injected sizes, population R²"
              values={control.sizes}
              isList
              width="11em"
              onChange={(sizes) => change('injection', { ...control, sizes })}
            />
            <NumberListField
              label="Sessions made per size"
              values={[control.draws]}
              onChange={([draws]) => change('injection', { ...control, draws })}
            />
            <span>sessions each: this takes long</span>
          </>
        );
      default:
        return null;
    }
  };
  return (
    <RecipeRow
      id="controls"
      term="Controls"
      because="What else could have made the number. Those that are ticked at the start run unless you take them away."
      checks={checks}
    >
      <ul>
        {(Object.keys(words) as Kind[]).map((kind) => {
          const present = form.controls.filter((control) => control.kind === kind);
          const made = first(kind);
          if (present.length === 0 && made === null && kind !== 'nuisanceOnly') return null;
          return (
            <li key={kind} className="opts" style={{ minHeight: 30 }}>
              <label>
                <input
                  type="checkbox"
                  checked={present.length > 0}
                  disabled={present.length === 0 && made === null}
                  onChange={() =>
                    set({
                      controls:
                        present.length > 0
                          ? form.controls.filter((control) => control.kind !== kind)
                          : made
                            ? [...form.controls, made]
                            : form.controls,
                    })
                  }
                />
                {words[kind]}
                {present.length === 0 && made === null && (
                  <span className="quiet"> (choose a nuisance first)</span>
                )}
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
