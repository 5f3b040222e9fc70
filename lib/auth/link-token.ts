import { createHmac, hkdfSync, timingSafeEqual } from 'node:crypto';
import { validate } from 'uuid';
import { env } from '@/lib/env/env';

export type LinkKind = 'invitation' | 'password-reset';

/**
 * The secret part of a link that goes out by mail: the row's id and a keyed hash of it. The database holds the id
 * only, so whoever reads the database cannot make a link; whether the link is still good, the row says.
 */
export function linkToken(kind: LinkKind, id: string): string {
  return `${id}.${sealOf(kind, id).toString('base64url')}`;
}

/** The id in a link's token; null where it is not one of ours. */
export function readLinkToken(kind: LinkKind, token: string): string | null {
  const [id = '', seal = '', ...rest] = token.split('.');
  if (rest.length > 0 || !validate(id)) return null;
  const given = Buffer.from(seal, 'base64url');
  const wanted = sealOf(kind, id);
  return given.length === wanted.length && timingSafeEqual(given, wanted) ? id : null;
}

function sealOf(kind: LinkKind, id: string): Buffer {
  const key = hkdfSync('sha256', env().AUTH_SECRET, '', 'outfold mail links', 32);
  return createHmac('sha256', Buffer.from(key)).update(`${kind}:${id}`).digest();
}
