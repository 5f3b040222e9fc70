import { AppError } from '@/lib/errors/app-error';

/** Turns the database's "this key exists" for an animal's code into a conflict that a member understands. */
export function refuseTakenCode(error: unknown, code: string): never {
  const isDuplicate = error instanceof Error && 'code' in error && error.code === 'ER_DUP_ENTRY';
  if (!isDuplicate) throw error;
  throw new AppError('conflict', `The study already has an animal ${code}. Codes are used once in a study.`, {
    faults: [{ pointer: '/code', code: 'taken', detail: 'this code is used by another animal of the study' }],
    cause: error,
  });
}
