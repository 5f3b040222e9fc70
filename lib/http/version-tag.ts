import { AppError } from '@/lib/errors/app-error';

/** The strong ETag of a versioned thing. */
export function versionTag(version: number): string {
  return `"v${version}"`;
}

/** The version that an If-Match header names. Missing: 428. Not one of our tags (a list or `*`, say): 412. */
export function requireIfMatch(request: Request): number {
  const header = request.headers.get('if-match');
  if (header === null)
    throw new AppError(
      'version-required',
      'Send If-Match with the ETag of the version that you are changing.',
    );
  const match = /^"v(\d{1,9})"$/.exec(header.trim());
  if (match === null)
    throw new AppError('stale-version', 'If-Match does not name a version of this; read it again and retry.');
  return Number(match[1]);
}
