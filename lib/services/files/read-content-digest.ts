import { AppError } from '@/lib/errors/app-error';

/**
 * The SHA-256 (hex) of a Content-Digest header, `sha-256=:<base64>:` (RFC 9530); null where there is no header or it
 * names other algorithms only.
 */
export function readContentDigest(header: string | null): string | null {
  if (header === null) return null;
  const found = /(?:^|,)\s*sha-256\s*=\s*:([^:]*):/i.exec(header);
  if (found === null) return null;
  const bytes = Buffer.from(found[1], 'base64');
  if (bytes.length !== 32)
    throw new AppError(
      'malformed-request',
      'The Content-Digest header does not hold a SHA-256 of 32 bytes in base64.',
    );
  return bytes.toString('hex');
}
