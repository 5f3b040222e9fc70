'use client';
import { ChoiceField } from '@/components/recipe/choice-field';
import type { SheetColumn } from '@/components/session/sheet-column';
import type { ControlRecipe } from '@/lib/contracts/recipe';

type Generalise = Extract<ControlRecipe, { kind: 'generalise' }>;

/** Which levels of a column are tested; a readout trained on the others must carry over to them. */
export function GeneraliseLevels({
  control,
  columns,
  onChange,
}: {
  control: Generalise;
  columns: readonly SheetColumn[];
  onChange: (control: Generalise) => void;
}) {
  const levelsOf = (name: string): (number | string)[] =>
    [...new Set(columns.find((column) => column.name === name)?.values ?? [])]
      .filter((value) => value !== null)
      .sort((a, b) =>
        typeof a === 'number' && typeof b === 'number' ? a - b : String(a).localeCompare(String(b)),
      );
  const levels = levelsOf(control.column);
  const toggle = (level: number | string): void => {
    const isTested = control.test.includes(level);
    const test = isTested ? control.test.filter((other) => other !== level) : [...control.test, level];
    onChange({ ...control, test, train: levels.filter((other) => !test.includes(other)) });
  };
  return (
    <>
      <ChoiceField
        label="Column"
        value={control.column}
        options={columns.map(({ name }) => ({ value: name, text: name }))}
        onChange={(column) => {
          const next = levelsOf(column);
          onChange({ ...control, column, train: next.slice(0, -1), test: next.slice(-1) });
        }}
      />
      <span>tested at</span>
      {levels.map((level) => (
        <label key={String(level)}>
          <input type="checkbox" checked={control.test.includes(level)} onChange={() => toggle(level)} />
          <span className="n">{level}</span>
        </label>
      ))}
      <span className="quiet">trained on the others</span>
    </>
  );
}
