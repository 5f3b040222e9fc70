import type { FieldValues, Path, UseFormReturn } from 'react-hook-form';
import { ApiError } from '@/lib/client/api-error';

/**
 * Puts a refusal where it belongs: each fault under its field (JSON pointer `/name`), the rest under the form.
 * An error that is no refusal of the service is thrown on.
 */
export function showFaults<Values extends FieldValues>(
  form: UseFormReturn<Values>,
  error: unknown,
  fields: readonly Path<Values>[],
): void {
  if (!(error instanceof ApiError)) throw error;
  let placed = 0;
  for (const field of fields) {
    const detail = error.faultAt(`/${field.replaceAll('.', '/')}`);
    if (detail === undefined) continue;
    form.setError(field, { message: sentence(detail) }, { shouldFocus: placed === 0 });
    placed += 1;
  }
  const rest = error.faults.length - placed;
  if (placed === 0 || rest > 0) form.setError('root', { message: error.message });
}

function sentence(text: string): string {
  const first = text.charAt(0).toUpperCase() + text.slice(1);
  return /[.!?]$/.test(first) ? first : `${first}.`;
}
