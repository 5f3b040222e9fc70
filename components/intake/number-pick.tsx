'use client';

import { useState } from 'react';

/** A number within a sentence. Says nothing to the page until what is typed is a number; a minus sign of either kind will do. */
export function NumberPick({
  label,
  value,
  isOptional = false,
  onChange,
}: {
  label: string;
  value: number | null;
  isOptional?: boolean;
  onChange: (value: number | null) => void;
}) {
  const [typed, setTyped] = useState<string | null>(null);
  const shown = typed ?? (value === null ? '' : String(value).replace('-', '−'));
  const read = (text: string) => {
    const number = Number(text.trim().replace('−', '-').replace(',', '.'));
    return text.trim() === '' || !Number.isFinite(number) ? null : number;
  };
  const isWrong = read(shown) === null && !(isOptional && shown.trim() === '');
  return (
    <input
      type="text"
      inputMode="decimal"
      className={isWrong ? 'n pick number-pick field-err' : 'n pick number-pick'}
      aria-label={label}
      aria-invalid={isWrong || undefined}
      size={Math.max(4, shown.length)}
      value={shown}
      onChange={(event) => {
        setTyped(event.target.value);
        onChange(read(event.target.value));
      }}
      onBlur={() => setTyped(null)}
    />
  );
}
