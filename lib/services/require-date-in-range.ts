import { AppError } from '@/lib/errors/app-error';

const firstYear = 1900;
const lastYear = 2199;

/** A date or instant that a recording can have; others are typing mistakes, and the database could not hold some. */
export function requireDateInRange(value: string, pointer: string): Date {
  const date = new Date(value);
  const year = date.getUTCFullYear();
  if (year >= firstYear && year <= lastYear) return date;
  const detail = `the year must lie between ${firstYear} and ${lastYear}`;
  throw new AppError('invalid-input', `Not valid: ${pointer}: ${detail}`, {
    faults: [{ pointer, code: 'out-of-range', detail }],
  });
}
