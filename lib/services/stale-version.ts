import { AppError } from '@/lib/errors/app-error';

/** The answer to a change that names a version which is not the present one. */
export function staleVersion(): AppError {
  return new AppError(
    'stale-version',
    'Somebody changed this in the meantime. Read it again and repeat the change.',
  );
}
