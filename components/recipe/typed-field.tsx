'use client';
import { useId } from 'react';
import { numbers } from '@/components/ui/numbers';

/** A field for a number or a short text inside a sentence; its error stands under it. */
export function TypedField({
  label,
  value,
  error,
  isText = false,
  width,
  onChange,
}: {
  /** Read out; the words around it are what is seen. */
  label: string;
  value: string;
  error?: string;
  isText?: boolean;
  width?: string;
  onChange: (value: string) => void;
}) {
  const id = useId();
  return (
    <span>
      <input
        type="text"
        className={`${isText ? '' : 'n'}${error ? ' field-err' : ''}`}
        inputMode={isText ? undefined : 'decimal'}
        style={width ? { width } : undefined}
        aria-label={label}
        aria-invalid={error ? true : undefined}
        aria-describedby={error ? id : undefined}
        value={value}
        onChange={(event) => onChange(event.target.value)}
      />
      {error && (
        <span className="err" id={id} style={{ display: 'block' }}>
          {numbers(error)}
        </span>
      )}
    </span>
  );
}
