import { Readable, Transform, pipeline } from 'node:stream';
import type { ReadableStream as WebReadableStream } from 'node:stream/web';
import { AppError } from '@/lib/errors/app-error';

export type Body = Uint8Array | Readable | WebReadableStream<Uint8Array> | ReadableStream<Uint8Array>;

/**
 * Sends a body whose stream may fail. The S3 client puts no error handler on a body, so a browser that goes away in
 * mid-upload would end the whole process, and a body shorter than announced would hang until a timeout; here either
 * aborts the request at once.
 *
 * @throws AppError('malformed-request') when the body is not `sizeBytes` long; the stream's own error when it broke off
 */
export async function withBody<T>(
  body: Body,
  sizeBytes: number,
  send: (body: Uint8Array | Readable, abortSignal: AbortSignal) => Promise<T>,
): Promise<T> {
  const controller = new AbortController();
  if (body instanceof Uint8Array) {
    if (body.length !== sizeBytes) throw wrongLength(body.length, sizeBytes);
    return send(body, controller.signal);
  }
  const source = body instanceof Readable ? body : Readable.fromWeb(body as WebReadableStream<Uint8Array>);
  let seenBytes = 0;
  const metered = new Transform({
    transform(chunk: Uint8Array, _encoding, callback) {
      seenBytes += chunk.length;
      callback(seenBytes > sizeBytes ? wrongLength(seenBytes, sizeBytes) : null, chunk);
    },
    flush(callback) {
      callback(seenBytes < sizeBytes ? wrongLength(seenBytes, sizeBytes) : null);
    },
  });
  let failure: Error | undefined;
  pipeline(source, metered, (error) => {
    if (!error) return;
    failure = error;
    controller.abort();
  });
  try {
    return await send(metered, controller.signal);
  } catch (error) {
    throw failure ?? error;
  } finally {
    source.destroy();
    metered.destroy();
  }
}

function wrongLength(seenBytes: number, sizeBytes: number): AppError {
  return new AppError(
    'malformed-request',
    seenBytes > sizeBytes
      ? `The body is longer than the ${sizeBytes} bytes that were announced.`
      : `The body ended after ${seenBytes} of the ${sizeBytes} bytes that were announced; send it again.`,
  );
}
