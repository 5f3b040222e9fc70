import type { Role } from '@/lib/contracts/lab';
import { actions, type Action } from './actions';

const reads: Action[] = [
  'study.read',
  'animal.read',
  'session.read',
  'file.read',
  'exclusion.read',
  'readout.read',
  'events.read',
  'member.read',
];
/** Everybody keeps their own tokens; a token never does more than its maker's present role. */
const ownTokens: Action[] = ['token.read', 'token.create', 'token.revoke'];
const labAdministration: Action[] = ['member.invite', 'member.change', 'audit.read'];

/** The policy: what each role in a lab includes. */
export const roleActions: Readonly<Record<Role, readonly Action[]>> = {
  lead: actions,
  analyst: actions.filter((action) => !labAdministration.includes(action)),
  experimenter: [
    ...reads,
    ...ownTokens,
    'animal.create',
    'animal.change',
    'session.create',
    'session.change',
    'file.upload',
    'intake.submit',
    'exclusion.create',
  ],
  observer: [...reads, ...ownTokens],
};
