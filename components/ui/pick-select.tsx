'use client';

/** A word in a sentence that can be changed: a select without its box. `label` is read out, the sentence around it is what sighted people read. */
export function PickSelect<Value extends string>({
  label,
  value,
  options,
  onChange,
  small = false,
}: {
  label: string;
  value: Value;
  options: readonly { value: Value; text: string }[];
  onChange: (value: Value) => void;
  small?: boolean;
}) {
  return (
    <select
      className={small ? 'pick pick-small' : 'pick'}
      aria-label={label}
      value={value}
      onChange={(event) => {
        const chosen = options.find((option) => option.value === event.target.value);
        if (chosen) onChange(chosen.value);
      }}
    >
      {options.map((option) => (
        <option key={option.value} value={option.value}>
          {option.text}
        </option>
      ))}
    </select>
  );
}
