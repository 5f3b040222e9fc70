import { readdir, readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { simpleParser, type ParsedMail } from 'mailparser';
import { requireServices } from '@/tests/support/services';

/** The mails that the local mail fake has taken for an address, oldest first. */
export async function keptMails(to: string): Promise<ParsedMail[]> {
  requireServices();
  const folder = process.env.OUTFOLD_MAIL_FOLDER!;
  const names = (await readdir(folder)).filter((name) => name.endsWith('.eml')).sort();
  const mails = await Promise.all(
    names.map(async (name) => simpleParser(await readFile(join(folder, name)))),
  );
  return mails.filter(({ to: recipients }) =>
    [recipients]
      .flat()
      .some((entry) => entry?.value.some(({ address }) => address?.toLowerCase() === to.toLowerCase())),
  );
}
