import { AppError } from '@/lib/errors/app-error';
import { passwordFaults } from './password-faults';

/** Throws `invalid-input` at the pointer where a new password breaks the rules. */
export function requireGoodPassword(password: string, context: readonly string[], pointer: string): void {
  const faults = passwordFaults(password, [...context, 'outfold']);
  if (faults.length === 0) return;
  throw new AppError('invalid-input', `This password cannot be used: ${faults[0].detail}.`, {
    faults: faults.map(({ code, detail }) => ({ pointer, code, detail })),
  });
}
