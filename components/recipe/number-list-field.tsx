'use client';
import { useState } from 'react';
import { readTypedNumber } from '@/components/recipe/read-typed-number';
import { TypedField } from '@/components/recipe/typed-field';

/**
 * Numbers typed inside a row that keeps them as numbers: one, or a list parted by commas. What cannot be read is handed on
 * as NaN, so that the form stops there, and said under the field.
 */
export function NumberListField({
  label,
  values,
  isList = false,
  width,
  onChange,
}: {
  label: string;
  values: readonly number[];
  isList?: boolean;
  width?: string;
  onChange: (values: number[]) => void;
}) {
  const [text, setText] = useState(values.filter(Number.isFinite).join(', '));
  const bad = values.length === 0 || values.some((value) => !Number.isFinite(value));
  return (
    <TypedField
      label={label}
      value={text}
      width={width ?? (isList ? '16em' : undefined)}
      error={bad ? (isList ? 'Numbers parted by commas.' : 'A number is needed.') : undefined}
      onChange={(next) => {
        setText(next);
        const parts = isList ? next.split(/[,;]\s*|\s+/).filter((part) => part !== '') : [next];
        onChange(parts.map((part) => readTypedNumber(part) ?? Number.NaN));
      }}
    />
  );
}
