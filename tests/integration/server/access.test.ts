import { execFileSync } from 'node:child_process';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { registeredRoutes } from '@/app/api/v1/openapi.json/registered-routes';
import type { Role } from '@/lib/contracts/lab';
import { httpMethods, type HttpMethod } from '@/lib/http/openapi/registered-route';
import type { RouteHandler } from '@/lib/http/route';
import { roleActions } from '@/lib/policy/role-actions';
import { scopeActions } from '@/lib/policy/scope-actions';
import { insertLab, type LabRows } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';
import { accessTable, type AccessRow } from './access-table';
import { addMember, call, cookieFor, tokenFor, type Call } from './support';
import { makeThings, type Things } from './things';

const routes = registeredRoutes.flatMap(({ path, methods }) =>
  httpMethods.flatMap((method) => {
    const handler = methods[method];
    return handler === undefined ? [] : [{ name: `${method} ${path}`, method, path, handler }];
  }),
);
const roles: Record<string, Role> = { l: 'lead', a: 'analyst', e: 'experimenter', o: 'observer' };

let drop: () => Promise<void>;
let lead: LabRows;
let foreignLead: LabRows;
let foreign: Things;
let readOnly: Things;
const members = new Map<Role, { member: LabRows; cookie: string }>();
beforeAll(async () => {
  drop = await freshDatabase();
  lead = await insertLab({ role: 'lead' });
  foreignLead = await insertLab({ role: 'lead' });
  foreign = await makeThings(foreignLead);
  readOnly = await makeThings(lead);
  for (const role of Object.values(roles)) {
    const member = role === 'lead' ? lead : await addMember(lead, role);
    members.set(role, { member, cookie: await cookieFor(member) });
  }
});
afterAll(() => drop());

function callOf(method: HttpMethod, path: string, row: AccessRow, things: Things): Call {
  const params = row.params?.(things) ?? {};
  const real = path.replaceAll(/\{(\w+)\}/g, (_all, name: string) => params[name] ?? '');
  return {
    method,
    path: real + (row.query?.(things) ?? ''),
    params,
    body: row.bytes ?? row.body?.(things),
    headers: {
      ...(row.ifMatch ? { 'if-match': row.ifMatch } : {}),
      ...(row.bytes
        ? { 'content-type': 'application/octet-stream', 'content-length': String(row.bytes.length) }
        : {}),
    },
  };
}

/** The status and the text of a call; an event stream is left after its first piece. */
async function outcome(handler: RouteHandler, input: Call): Promise<{ status: number; text: string }> {
  const response = await call(handler, input);
  if (response.headers.get('content-type')?.startsWith('text/event-stream')) {
    await response.body?.cancel();
    return { status: response.status, text: '' };
  }
  return { status: response.status, text: await response.text() };
}

describe('the access table', () => {
  it('has a row for every route and a route for every row', () => {
    expect(Object.keys(accessTable).sort()).toEqual(routes.map(({ name }) => name).sort());
  });

  it('is about all route files there are', () => {
    execFileSync(process.execPath, ['scripts/list-routes.mjs', '--check']);
  });

  it('agrees with what each route says about itself', () => {
    for (const { name, handler } of routes) {
      const { access, action } = handler.definition;
      expect(accessTable[name].roles === 'public', name).toBe(access === 'public');
      if (access === 'public' || action === null) continue;
      const allowed = Object.entries(roles).filter(([, role]) => roleActions[role].includes(action));
      expect(allowed.map(([letter]) => letter).join(''), name).toBe(accessTable[name].roles);
    }
  });
});

describe.each(routes.map((item) => [item.name, item] as const))('%s', (name, { method, path, handler }) => {
  const row = accessTable[name] ?? { roles: '' };

  if (row.roles === 'public') {
    it('answers anybody', async () => {
      const { status } = await outcome(handler, callOf(method, path, row, foreign));
      // Links that nobody made lead nowhere, for everybody alike.
      expect(path.includes('{') || row.body === undefined ? [200, 503] : [204, 404]).toContain(status);
    });
    return;
  }

  it('asks for a sign-in', async () => {
    const input = callOf(method, path, row, foreign);
    expect((await outcome(handler, input)).status).toBe(401);
    expect((await outcome(handler, { ...input, token: 'outfold_bad' })).status).toBe(401);
    expect((await outcome(handler, { ...input, cookie: 'outfold.session=bad' })).status).toBe(401);
  });

  it.each(Object.entries(roles))('%s', async (letter, role) => {
    const { member, cookie } = members.get(role)!;
    const isAllowed = row.roles.includes(letter);

    const own = method === 'GET' ? readOnly : await makeThings(lead, member);
    const mine = await outcome(handler, { ...callOf(method, path, row, own), cookie });
    if (isAllowed) {
      expect([401, 403, 404], `own: ${mine.status} ${mine.text.slice(0, 300)}`).not.toContain(mine.status);
      expect(mine.status, mine.text.slice(0, 300)).toBeLessThan(500);
    } else expect(mine.status, mine.text.slice(0, 300)).toBe(403);
    // The audit trail repeats the addresses that this lab's members were refused at above; foreign members it never names.
    const foreignIds = path === '/api/v1/audit' ? [foreignLead.userId] : Object.values(foreign);
    for (const id of foreignIds) expect(mine.text).not.toContain(id);

    if (row.params === undefined && row.query === undefined && row.body?.(own) === undefined) return;
    const theirs = await outcome(handler, { ...callOf(method, path, row, foreign), cookie });
    const namesForeignThing =
      JSON.stringify(callOf(method, path, row, foreign)) !== JSON.stringify(callOf(method, path, row, own));
    const isTheSame =
      row.params === undefined &&
      row.query === undefined &&
      !Object.values(foreign).some((id) => JSON.stringify(row.body?.(foreign)).includes(id));
    if (isTheSame || !namesForeignThing) return;
    expect(theirs.status, theirs.text.slice(0, 300)).toBe(isAllowed ? 404 : 403);
  });

  it('refuses a token whose scopes do not cover it', async () => {
    const { access, action } = handler.definition;
    if (access === 'signedIn') {
      const token = await tokenFor(lead, ['read', 'intake', 'readouts', 'manage']);
      expect((await outcome(handler, { ...callOf(method, path, row, readOnly), token })).status).toBe(403);
      return;
    }
    if (action === null) return;
    const own = method === 'GET' ? readOnly : await makeThings(lead);
    const token = await tokenFor(lead, ['read']);
    const { status } = await outcome(handler, { ...callOf(method, path, row, own), token });
    const isRead = scopeActions.read.includes(action);
    if (isRead) expect([401, 403, 404]).not.toContain(status);
    else expect(status).toBe(403);
  });
});
