import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { mailTransport } from '@/lib/mail/mail-transport';
import { sendMail } from '@/lib/mail/send-mail';
import { control } from '@/tests/support/control';
import { keptMails } from '@/tests/support/kept-mails';
import { requireServices } from '@/tests/support/services';

describe('mail', () => {
  beforeAll(requireServices);

  it('reaches the address whole, in any script, and nobody else', async () => {
    await sendMail({
      to: 'wren@lab.test',
      subject: 'Ünit 7 – σ²',
      text: 'First line\n.\nA line with only a dot above\n',
    });
    const [mail] = await keptMails('wren@lab.test');
    expect(mail.subject).toBe('Ünit 7 – σ²');
    expect(mail.text?.trimEnd()).toBe('First line\n.\nA line with only a dot above');
    expect(mail.from?.text).toContain('no-reply@outfold.test');
    expect(await keptMails('somebody@lab.test')).toEqual([]);
  });

  it('cannot be made to add recipients or headers by what is in a field', async () => {
    await sendMail({
      to: 'fern@lab.test',
      subject: 'One\r\nBcc: moss@lab.test',
      text: 'x',
    });
    const [mail] = await keptMails('fern@lab.test');
    expect(mail.bcc).toBeUndefined();
    expect(mail.headers.has('bcc')).toBe(false);
    expect(await keptMails('moss@lab.test')).toEqual([]);
    await sendMail({ to: 'a@lab.test, moss@lab.test', subject: 's', text: 'x' }).catch(() => {});
    expect(await keptMails('moss@lab.test')).toEqual([]);
  });

  it('signs in to the mail server', async () => {
    await expect(mailTransport().verify()).resolves.toBe(true);
  });

  describe('while the mail server is away', () => {
    beforeAll(() => control('mail', 'stop'));
    afterAll(() => control('mail', 'start'));

    it('says so', async () => {
      await expect(sendMail({ to: 'wren@lab.test', subject: 's', text: 'x' })).rejects.toMatchObject({
        code: 'unavailable',
      });
    });
  });
});
