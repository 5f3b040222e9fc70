import type { Scope } from '@/lib/contracts/lab';
import type { Action } from './actions';

const reads: Action[] = [
  'study.read',
  'animal.read',
  'session.read',
  'file.read',
  'exclusion.read',
  'readout.read',
  'events.read',
];

/**
 * What a bearer token's scopes cover. Each scope that writes covers reading too, because a script has to
 * follow what it started.
 */
export const scopeActions: Readonly<Record<Scope, readonly Action[]>> = {
  read: reads,
  intake: [
    ...reads,
    'study.create',
    'animal.create',
    'session.create',
    'file.upload',
    'intake.submit',
    'exclusion.create',
  ],
  readouts: [...reads, 'exclusion.create', 'readout.create', 'readout.cancel'],
  manage: [
    ...reads,
    'study.create',
    'study.change',
    'animal.create',
    'animal.change',
    'session.create',
    'session.change',
    'token.read',
    'token.create',
    'token.revoke',
    'member.read',
    'member.invite',
    'member.change',
    'audit.read',
  ],
};
