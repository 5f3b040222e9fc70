import { useId, type ReactNode } from 'react';

/** What a control inside a Field must carry: spread it on the input, select or textarea. */
export interface FieldControl {
  id: string;
  className: string | undefined;
  'aria-invalid': true | undefined;
  'aria-describedby': string | undefined;
}

/**
 * A label above, the control, a hint, and below it the error: what is wrong and what to do.
 *   <Field label="Name" error={errors.name}>{(control) => <input type="text" {...control} {...register('name')} />}</Field>
 */
export function Field({
  label,
  hint,
  error,
  children,
}: {
  label: ReactNode;
  hint?: ReactNode;
  error?: ReactNode;
  children: (control: FieldControl) => ReactNode;
}) {
  const id = useId();
  const describedBy = [hint ? `${id}-hint` : '', error ? `${id}-err` : ''].filter(Boolean).join(' ');
  return (
    <div className="field">
      <label htmlFor={id}>{label}</label>
      {children({
        id,
        className: error ? 'field-err' : undefined,
        'aria-invalid': error ? true : undefined,
        'aria-describedby': describedBy || undefined,
      })}
      {error ? (
        <p className="err" id={`${id}-err`}>
          {error}
        </p>
      ) : null}
      {hint ? (
        <p className="hint" id={`${id}-hint`}>
          {hint}
        </p>
      ) : null}
    </div>
  );
}
