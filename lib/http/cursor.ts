import { AppError } from '@/lib/errors/app-error';

/** A keyset cursor, opaque to the caller: where the next page starts. */
export function encodeCursor(parts: (string | number)[]): string {
  return Buffer.from(JSON.stringify(parts)).toString('base64url');
}

/** The parts of a cursor that we gave out; `undefined` (first page) gives null. Others are refused. */
export function decodeCursor(cursor: string | undefined, length: number): (string | number)[] | null {
  if (cursor === undefined) return null;
  try {
    const parts: unknown = JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'));
    if (
      Array.isArray(parts) &&
      parts.length === length &&
      parts.every((part) => typeof part === 'string' || typeof part === 'number')
    )
      return parts;
  } catch {
    // falls through to the refusal below
  }
  throw new AppError('invalid-input', 'The cursor is not one that this list gave out.', {
    faults: [{ pointer: '/cursor', code: 'invalid-cursor', detail: 'not a cursor of this list' }],
  });
}
