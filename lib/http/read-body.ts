import { AppError } from '@/lib/errors/app-error';

/** Refuses a body whose announced length is over the cap, before anything of it is read. */
export function checkContentLength(request: Request, maxBytes: number): void {
  const header = request.headers.get('content-length');
  if (header === null) return;
  if (!/^\d{1,15}$/.test(header)) throw new AppError('malformed-request', 'Content-Length is not a number.');
  if (Number(header) > maxBytes) throw tooLarge(maxBytes);
}

/** Reads a whole body of at most `maxBytes`; stops reading as soon as there is more. */
export async function readBody(request: Request, maxBytes: number): Promise<Uint8Array> {
  if (request.body === null) return new Uint8Array(0);
  const chunks: Uint8Array[] = [];
  let sizeBytes = 0;
  const reader = request.body.getReader();
  for (;;) {
    let step: ReadableStreamReadResult<Uint8Array>;
    try {
      step = await reader.read();
    } catch (cause) {
      throw new AppError('malformed-request', 'The body broke off before its end.', { cause });
    }
    if (step.done) break;
    sizeBytes += step.value.byteLength;
    if (sizeBytes > maxBytes) {
      await reader.cancel().catch(() => undefined);
      throw tooLarge(maxBytes);
    }
    chunks.push(step.value);
  }
  const bytes = new Uint8Array(sizeBytes);
  let offset = 0;
  for (const chunk of chunks) {
    bytes.set(chunk, offset);
    offset += chunk.byteLength;
  }
  return bytes;
}

function tooLarge(maxBytes: number): AppError {
  return new AppError('too-large', `The body may hold at most ${maxBytes} bytes here.`);
}
