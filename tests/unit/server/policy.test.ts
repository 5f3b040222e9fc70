import { describe, expect, it } from 'vitest';
import type { Role, Scope } from '@/lib/contracts/lab';
import { actions, type Action } from '@/lib/policy/actions';
import { can } from '@/lib/policy/can';
import { roleScopes } from '@/lib/policy/role-scopes';

/**
 * The policy as people were promised it, written down a second time on purpose: l lead, a analyst, e experimenter,
 * o observer; after the slash the token scopes that cover the action: r read, i intake, u readouts, m manage.
 * Common practice of labs, no source.
 */
const promised: Record<Action, string> = {
  'study.read': 'laeo/rium',
  'study.create': 'la/im',
  'study.change': 'la/m',
  'animal.read': 'laeo/rium',
  'animal.create': 'lae/im',
  'animal.change': 'lae/m',
  'session.read': 'laeo/rium',
  'session.create': 'lae/im',
  'session.change': 'lae/m',
  'file.read': 'laeo/rium',
  'file.upload': 'lae/i',
  'intake.submit': 'lae/i',
  'exclusion.read': 'laeo/rium',
  'exclusion.create': 'lae/iu',
  'readout.read': 'laeo/rium',
  'readout.create': 'la/u',
  'readout.cancel': 'la/u',
  'token.read': 'laeo/m',
  'token.create': 'laeo/m',
  'token.revoke': 'laeo/m',
  'member.read': 'laeo/m',
  'member.invite': 'l/m',
  'member.change': 'l/m',
  'audit.read': 'l/m',
  'events.read': 'laeo/rium',
};
const roles: Record<string, Role> = { l: 'lead', a: 'analyst', e: 'experimenter', o: 'observer' };
const scopes: Record<string, Scope> = { r: 'read', i: 'intake', u: 'readouts', m: 'manage' };
const labId = 'lab-1';

describe('the policy table', () => {
  it('is written down here for every action', () => {
    expect(Object.keys(promised).sort()).toEqual([...actions].sort());
  });

  it.each(actions.map((action) => [action]))('%s: each role, each scope, own and other lab', (action) => {
    const [forRoles, forScopes] = promised[action].split('/');
    for (const [letter, role] of Object.entries(roles)) {
      const member = { kind: 'member', labId, role, scopes: null } as const;
      const allowed = forRoles.includes(letter);
      expect(can(member, action), `${role} ${action}`).toBe(allowed);
      expect(can(member, action, { labId })).toBe(allowed);
      expect(can(member, action, { labId: 'lab-2' }), `${role} ${action} elsewhere`).toBe(false);
      expect(can(member, action, null)).toBe(false);
      for (const [mark, scope] of Object.entries(scopes)) {
        const token = { kind: 'token', labId, role, scopes: [scope] } as const;
        expect(can(token, action), `${role} token ${scope} ${action}`).toBe(
          allowed && forScopes.includes(mark),
        );
        expect(can(token, action, { labId: 'lab-2' })).toBe(false);
      }
      expect(can({ kind: 'token', labId, role, scopes: [] }, action)).toBe(false);
    }
  });

  it('lets the system act within its lab only', () => {
    const system = { kind: 'system', labId, role: 'observer', scopes: null } as const;
    expect(can(system, 'readout.create', { labId })).toBe(true);
    expect(can(system, 'readout.create', { labId: 'lab-2' })).toBe(false);
  });

  it('never offers a role a scope of which it could use nothing but reading, save read itself', () => {
    for (const role of Object.values(roles))
      for (const scope of roleScopes[role].filter((item) => item !== 'read')) {
        const extra = actions.filter(
          (action) =>
            !action.endsWith('.read') && can({ kind: 'token', labId, role, scopes: [scope] }, action),
        );
        expect(extra, `${role} ${scope}`).not.toHaveLength(0);
      }
  });
});
