'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import { readTypedNumber } from '@/components/recipe/read-typed-number';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RowProps } from '@/components/recipe/rows/row-props';
import { TypedField } from '@/components/recipe/typed-field';
import { WindowPicker } from '@/components/recipe/window-picker';
import { formatNumber } from '@/lib/format/format-number';
import { formatValue } from '@/lib/format/format-value';

/** When spikes are counted, and what of them becomes a feature. */
export function WindowRow({ form, set, facts, checks, faultOf }: RowProps) {
  const last = facts.windowStartMs + facts.nBins * facts.binWidthMs;
  const recorded = `Recorded from ${formatNumber(facts.windowStartMs, 0)} to ${formatNumber(last, 0)} ms in bins of ${formatValue(facts.binWidthMs)} ms.`;
  return (
    <RecipeRow
      id="window"
      term="Window"
      because={
        facts.populationRateHz
          ? `Drag the handles, or type. The arrow keys move a handle by one bin. ${recorded}`
          : recorded
      }
      checks={checks}
    >
      {facts.populationRateHz && (
        <WindowPicker
          rateHz={facts.populationRateHz}
          windowStartMs={facts.windowStartMs}
          binWidthMs={facts.binWidthMs}
          startMs={readTypedNumber(form.startMs) ?? Number.NaN}
          endMs={readTypedNumber(form.endMs) ?? Number.NaN}
          onChange={(startMs, endMs) => set({ startMs: String(startMs), endMs: String(endMs) })}
        />
      )}
      <div className="inline">
        <span>from</span>
        <TypedField
          label="Start, ms"
          value={form.startMs}
          error={faultOf('startMs')}
          onChange={(startMs) => set({ startMs })}
        />
        <span>to</span>
        <TypedField
          label="End, ms"
          value={form.endMs}
          error={faultOf('endMs')}
          onChange={(endMs) => set({ endMs })}
        />
        <span>ms, as</span>
        <ChoiceField
          label="Features"
          value={form.features}
          options={[
            { value: 'windowMean', text: 'mean rate' },
            { value: 'bins', text: 'each bin' },
          ]}
          onChange={(features) => set({ features })}
        />
        <span>then</span>
        <ChoiceField
          label="Transform"
          value={form.transform}
          options={[
            { value: 'none', text: 'no transform' },
            { value: 'sqrt', text: 'square root' },
          ]}
          onChange={(transform) => set({ transform })}
        />
      </div>
    </RecipeRow>
  );
}
