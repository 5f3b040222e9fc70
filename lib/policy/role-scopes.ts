import type { Role, Scope } from '@/lib/contracts/lab';

/** The scopes that each role may give to a token; more would promise what the role cannot keep. */
export const roleScopes: Readonly<Record<Role, readonly Scope[]>> = {
  lead: ['read', 'intake', 'readouts', 'manage'],
  analyst: ['read', 'intake', 'readouts'],
  experimenter: ['read', 'intake'],
  observer: ['read'],
};
