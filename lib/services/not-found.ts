import { AppError } from '@/lib/errors/app-error';

/** The one answer for what is missing and for what is in another lab. */
export function notFound(): AppError {
  return new AppError('not-found', 'There is nothing at this address, or it is not in your lab.');
}
