'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import { RadioWords } from '@/components/recipe/radio-words';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RowProps } from '@/components/recipe/rows/row-props';
import { TypedField } from '@/components/recipe/typed-field';
import { unitsWords } from '@/components/recipe/units-words';
import { formatPlural } from '@/lib/format/format-plural';

/** Which units are used. A rule may look at rates, presence and unit columns, never at the label. */
export function UnitsRow({ form, set, facts, checks, faultOf }: RowProps) {
  const areas = [...new Set(facts.units.map((unit) => unit.area).filter((area) => area !== null))].sort();
  const out = facts.excludedUnits.length;
  return (
    <RecipeRow
      id="units"
      term="Units"
      because={`A rule may not look at the label.${out > 0 ? ` ${formatPlural(out, 'unit')} left out on the session’s page stay out.` : ''}`}
      checks={checks}
    >
      <RadioWords
        name="units"
        legend="Units"
        value={form.units}
        options={[
          { value: 'all', text: 'all that are in' },
          { value: 'rule', text: 'by rule' },
          ...(areas.length > 1 ? [{ value: 'area' as const, text: 'one area' }] : []),
          { value: 'list', text: 'a list' },
          ...(form.units === 'kept' ? [{ value: 'kept' as const, text: 'as in the repeated readout' }] : []),
        ]}
        onChange={(units) => set({ units })}
      />
      {form.units === 'rule' && (
        <div className="inline">
          <span>rate at least</span>
          <TypedField
            label="Least rate, spikes/s"
            value={form.minRate}
            error={faultOf('minRate')}
            onChange={(minRate) => set({ minRate })}
          />
          <span>spikes/s and presence at least</span>
          <TypedField
            label="Least presence"
            value={form.minPresence}
            error={faultOf('minPresence')}
            onChange={(minPresence) => set({ minPresence })}
          />
        </div>
      )}
      {form.units === 'area' && (
        <div className="inline">
          <ChoiceField
            label="Area"
            value={form.area}
            options={areas.map((area) => ({
              value: area,
              text: `${area}, ${facts.units.filter((unit) => unit.area === area).length}`,
            }))}
            onChange={(area) => set({ area })}
          />
        </div>
      )}
      {form.units === 'list' && (
        <div className="inline">
          <span>units</span>
          <TypedField
            label="Units, such as 1-20, 34"
            isText
            width="20em"
            value={form.unitList}
            error={faultOf('unitList')}
            onChange={(unitList) => set({ unitList })}
          />
        </div>
      )}
      {form.units === 'kept' && form.from && <p className="say">{unitsWords(form.from.units)}</p>}
    </RecipeRow>
  );
}
