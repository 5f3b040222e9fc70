import { AppError } from '@/lib/errors/app-error';

/** A JSON body's value; refuses other content types (415), bad UTF-8 and bad JSON (400). */
export function parseJson(request: Request, bytes: Uint8Array): unknown {
  const type = (request.headers.get('content-type') ?? '').split(';')[0].trim().toLowerCase();
  if (type !== 'application/json')
    throw new AppError('unsupported-format', 'Send the body as application/json.');
  let text: string;
  try {
    text = new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch (cause) {
    throw new AppError('malformed-request', 'The body is not valid UTF-8.', { cause });
  }
  if (text.trim() === '')
    throw new AppError('malformed-request', 'The body is empty; a JSON object is needed.');
  try {
    return JSON.parse(text);
  } catch (cause) {
    const reason = cause instanceof Error ? cause.message.replace(/"[^"]{60,}"/, '…') : '';
    throw new AppError('malformed-request', `The body is not valid JSON: ${reason}.`, { cause });
  }
}
