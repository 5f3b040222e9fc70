import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POST as accept } from '@/app/api/v1/invitations/accept/route';
import { POST as look } from '@/app/api/v1/invitations/look/route';
import { DELETE as revoke } from '@/app/api/v1/invitations/[id]/route';
import { GET as listInvitations, POST as invite } from '@/app/api/v1/invitations/route';
import { POST as changePassword } from '@/app/api/v1/me/password/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import { POST as endOthers } from '@/app/api/v1/me/sign-ins/end-others/route';
import { GET as listSignIns } from '@/app/api/v1/me/sign-ins/route';
import { DELETE as removeMember, PATCH as changeMember } from '@/app/api/v1/members/[id]/route';
import { GET as listMembers } from '@/app/api/v1/members/route';
import { POST as completeReset } from '@/app/api/v1/password-resets/complete/route';
import { POST as requestReset } from '@/app/api/v1/password-resets/route';
import { GET as verification } from '@/app/api/v1/audit/verification/route';
import { GET as listAudit } from '@/app/api/v1/audit/route';
import { db } from '@/db/connection';
import { linkToken } from '@/lib/auth/link-token';
import { verifyCredentials } from '@/lib/auth/verify-credentials';
import { sendWaitingMails } from '@/lib/services/mails/send-waiting-mails';
import { control } from '@/tests/support/control';
import { keptMails } from '@/tests/support/kept-mails';
import { insertLab, type LabRows } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';
import { addMember, call, cookieFor, givePassword, password, tokenFor } from './support';

let drop: () => Promise<void>;
let lead: LabRows;
let cookie: string;
beforeAll(async () => {
  drop = await freshDatabase();
  lead = await insertLab();
  await givePassword(lead);
  cookie = await cookieFor(lead);
});
afterAll(() => drop());

const json = async (response: Response) => (await response.json()) as Record<string, unknown>;
const secondPhrase = 'lantern on the hill';
/** Signs in with the real check; null where the password does not fit. */
const signIn = (email: string, secret: string) =>
  verifyCredentials({ email, password: secret, address: '10.1.1.1', requestId: 'test-request' });
/** The secret of the link in the newest mail to an address. */
async function linkIn(email: string): Promise<string> {
  await sendWaitingMails();
  const text = (await keptMails(email)).at(-1)?.text ?? '';
  return /#(\S+)/.exec(text)?.[1] ?? '';
}
const publicPost = (handler: typeof accept, body: unknown) => call(handler, { method: 'POST', body });

describe('an invitation', () => {
  it('goes out by mail, shows what it is about, and makes an account that can sign in', async () => {
    const sent = await call(invite, {
      method: 'POST',
      cookie,
      body: { email: 'New.Person@lab.test', role: 'analyst' },
    });
    expect(sent.status).toBe(201);
    const token = await linkIn('new.person@lab.test');
    expect(token).not.toBe('');
    const mail = (await keptMails('new.person@lab.test')).at(-1)!;
    expect(mail.subject).toContain(lead.labName);
    expect(mail.text).toContain(lead.userName);
    expect(await json(await publicPost(look, { token }))).toEqual({
      email: 'new.person@lab.test',
      role: 'analyst',
      labName: lead.labName,
      inviterName: lead.userName,
      hasAccount: false,
    });
    const weak = await publicPost(accept, { token, name: 'New Person', password: 'new.person@lab.test' });
    expect(weak.status).toBe(422);
    expect((await json(weak)).errors).toMatchObject([{ pointer: '/password', code: 'about-you' }]);
    expect((await publicPost(accept, { token, password: secondPhrase })).status).toBe(422);
    expect((await publicPost(accept, { token, name: 'New Person', password: secondPhrase })).status).toBe(
      200,
    );
    expect((await signIn('new.person@lab.test', secondPhrase))?.actor).toMatchObject({
      labId: lead.labId,
      role: 'analyst',
    });
    expect((await publicPost(accept, { token, name: 'Again', password: secondPhrase })).status).toBe(404);
    expect(JSON.stringify(await db()('mails'))).not.toContain(token.split('.')[1]);
  });

  it('is worth nothing when forged, revoked, replaced or too old', async () => {
    const email = 'second@lab.test';
    const made = await json(await call(invite, { method: 'POST', cookie, body: { email, role: 'lead' } }));
    const first = linkToken('invitation', String(made.id));
    expect((await publicPost(look, { token: first })).status).toBe(200);
    expect((await publicPost(look, { token: linkToken('password-reset', String(made.id)) })).status).toBe(
      404,
    );
    expect((await publicPost(look, { token: `${String(made.id)}.AAAA` })).status).toBe(404);
    const again = await json(
      await call(invite, { method: 'POST', cookie, body: { email, role: 'observer' } }),
    );
    expect((await publicPost(look, { token: first })).status).toBe(404);
    const second = linkToken('invitation', String(again.id));
    await db()('invitations')
      .where({ id: again.id })
      .update({ expires_at: new Date(Date.now() - 1000) });
    expect((await publicPost(look, { token: second })).status).toBe(404);
    await db()('invitations')
      .where({ id: again.id })
      .update({ expires_at: new Date(Date.now() + 60_000) });
    expect((await call(revoke, { method: 'DELETE', cookie, params: { id: String(again.id) } })).status).toBe(
      204,
    );
    expect((await call(revoke, { method: 'DELETE', cookie, params: { id: String(again.id) } })).status).toBe(
      409,
    );
    expect((await publicPost(accept, { token: second, name: 'N', password: secondPhrase })).status).toBe(404);
    const list = await json(await call(listInvitations, { cookie }));
    expect((list.items as { state: string }[]).map(({ state }) => state)).toEqual([
      'revoked',
      'revoked',
      'accepted',
    ]);
  });

  it('brings somebody who has an account into a second lab, with the password they have', async () => {
    const other = await insertLab();
    await givePassword(other);
    const made = await json(
      await call(invite, { method: 'POST', cookie, body: { email: other.email, role: 'observer' } }),
    );
    const token = linkToken('invitation', String(made.id));
    expect(await json(await publicPost(look, { token }))).toMatchObject({ hasAccount: true });
    expect((await publicPost(accept, { token, name: 'X', password: secondPhrase })).status).toBe(422);
    expect((await publicPost(accept, { token, password })).status).toBe(200);
    const names = ((await json(await call(listMembers, { cookie }))).items as { email: string }[]).map(
      ({ email }) => email,
    );
    expect(names).toContain(other.email);
    expect(
      (await call(invite, { method: 'POST', cookie, body: { email: other.email, role: 'lead' } })).status,
    ).toBe(409);
  });
});

describe('a mail', () => {
  it('waits while the mail server is away, and goes out once when it is back', async () => {
    await control('mail', 'stop');
    try {
      await call(invite, { method: 'POST', cookie, body: { email: 'late@lab.test', role: 'observer' } });
      await sendWaitingMails();
      expect(await db()('mails').where({ recipient: 'late@lab.test' }).first()).toMatchObject({
        sent_at: null,
        attempts: 1,
      });
    } finally {
      await control('mail', 'start');
    }
    await db()('mails')
      .where({ recipient: 'late@lab.test' })
      .update({ next_at: new Date(0) });
    await Promise.all([sendWaitingMails(), sendWaitingMails(), sendWaitingMails()]);
    expect(await keptMails('late@lab.test')).toHaveLength(1);
  });
});

describe('a password', () => {
  it('changes for who knows the present one; other sessions end, this one and tokens go on', async () => {
    const member = await addMember(lead, 'analyst');
    await givePassword(member);
    const here = await cookieFor(member);
    const there = await cookieFor(member);
    const token = await tokenFor(member, ['read']);
    const post = (body: unknown) => call(changePassword, { method: 'POST', cookie: here, body });
    expect((await post({ present: 'wrong', next: secondPhrase })).status).toBe(422);
    expect((await post({ present: password, next: 'too short' })).status).toBe(422);
    expect((await post({ present: password, next: secondPhrase })).status).toBe(204);
    expect((await call(getMe, { cookie: here })).status).toBe(200);
    expect((await call(getMe, { cookie: there })).status).toBe(401);
    expect((await call(getMe, { token })).status).toBe(200);
    expect(await signIn(member.email, password)).toBeNull();
    expect(await signIn(member.email, secondPhrase)).not.toBeNull();
    await sendWaitingMails();
    expect((await keptMails(member.email)).at(-1)?.subject).toContain('changed');
  });

  it('can be set anew by a link from a mail, once, within its hour; all sessions end', async () => {
    const member = await addMember(lead, 'observer');
    await givePassword(member);
    const session = await cookieFor(member);
    expect((await publicPost(requestReset, { email: member.email })).status).toBe(204);
    expect((await publicPost(requestReset, { email: 'nobody@lab.test' })).status).toBe(204);
    const token = await linkIn(member.email);
    expect(await keptMails('nobody@lab.test')).toHaveLength(0);
    expect((await publicPost(completeReset, { token, password: 'aaaaaaaaaaaaaaaaaaaa' })).status).toBe(422);
    expect((await publicPost(completeReset, { token, password: secondPhrase })).status).toBe(204);
    expect((await publicPost(completeReset, { token, password: 'another phrase altogether' })).status).toBe(
      404,
    );
    expect((await call(getMe, { cookie: session })).status).toBe(401);
    expect(await signIn(member.email, secondPhrase)).not.toBeNull();

    await publicPost(requestReset, { email: member.email });
    const late = await linkIn(member.email);
    await db()('password_resets')
      .where({ user_id: member.userId })
      .update({ expires_at: new Date(Date.now() - 1000) });
    expect(
      (await publicPost(completeReset, { token: late, password: 'another phrase altogether' })).status,
    ).toBe(404);
    const statuses: number[] = [];
    for (let n = 0; n < 4; n++)
      statuses.push((await publicPost(requestReset, { email: member.email })).status);
    expect(statuses.at(-1)).toBe(429);
  });
});

describe('sessions', () => {
  it('are listed and can be ended', async () => {
    const member = await addMember(lead, 'observer');
    const here = await cookieFor(member);
    const there = await cookieFor(member);
    const { items } = (await json(await call(listSignIns, { cookie: here }))) as {
      items: { isThisOne: boolean }[];
    };
    expect(items.map(({ isThisOne }) => isThisOne)).toEqual([false, true]);
    expect(await json(await call(endOthers, { method: 'POST', cookie: here }))).toEqual({ ended: 1 });
    expect((await call(getMe, { cookie: there })).status).toBe(401);
    expect((await call(getMe, { cookie: here })).status).toBe(200);
  });
});

describe('members', () => {
  it('get another role at once, and a lab keeps a lead', async () => {
    const lab = await insertLab();
    const leads = await cookieFor(lab);
    const member = await addMember(lab, 'observer');
    const theirs = await cookieFor(member);
    const change = (userId: string, role: string) =>
      call(changeMember, { method: 'PATCH', cookie: leads, params: { id: userId }, body: { role } });
    expect((await change(lab.userId, 'observer')).status).toBe(409);
    expect((await change(member.userId, 'analyst')).status).toBe(204);
    expect(await json(await call(getMe, { cookie: theirs }))).toMatchObject({ role: 'analyst' });
    expect(
      (await call(removeMember, { method: 'DELETE', cookie: leads, params: { id: lab.userId } })).status,
    ).toBe(409);
    expect(
      (await call(removeMember, { method: 'DELETE', cookie: leads, params: { id: member.userId } })).status,
    ).toBe(204);
    expect((await call(getMe, { cookie: theirs })).status).toBe(401);
  });

  it('two leads who step down at once leave one', async () => {
    const lab = await insertLab();
    const second = await addMember(lab, 'lead');
    const [a, b] = [await cookieFor(lab), await cookieFor(second)];
    const answers = await Promise.all([
      call(changeMember, {
        method: 'PATCH',
        cookie: a,
        params: { id: second.userId },
        body: { role: 'observer' },
      }),
      call(changeMember, {
        method: 'PATCH',
        cookie: b,
        params: { id: lab.userId },
        body: { role: 'observer' },
      }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([204, 409]);
    expect(await db()('memberships').where({ lab_id: lab.labId, role: 'lead' })).toHaveLength(1);
  });
});

describe('the audit trail', () => {
  it('tells a lead what happened, and that the chain holds', async () => {
    const list = (await json(await call(listAudit, { cookie, path: '/?limit=200' }))) as {
      items: { action: string }[];
    };
    const actions = new Set(list.items.map(({ action }) => action));
    for (const action of [
      'member.invite',
      'member.join',
      'account.changePassword',
      'account.resetPassword',
      'account.signIn',
    ])
      expect(actions, action).toContain(action);
    expect(JSON.stringify(list)).not.toContain(secondPhrase);
    const observer = await addMember(lead, 'observer');
    expect(
      (
        await call(invite, {
          method: 'POST',
          cookie: await cookieFor(observer),
          body: { email: 'x@lab.test', role: 'lead' },
        })
      ).status,
    ).toBe(403);
    const newest = (await json(await call(listAudit, { cookie, path: '/?limit=1' }))) as {
      items: { action: string }[];
    };
    expect(newest.items[0]).toMatchObject({
      action: 'request.refused',
      actorId: observer.userId,
      subjectId: 'POST',
    });
    expect(await json(await call(verification, { cookie }))).toMatchObject({ holds: true, faults: [] });
  });
});
