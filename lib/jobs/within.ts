import { AppError } from '@/lib/errors/app-error';

/**
 * Waits for `work`, at most `limitMs`. BullMQ waits for a connection without an end; nothing of ours may.
 * @throws AppError 'unavailable' when the limit passes first
 */
export async function within<T>(work: Promise<T>, limitMs: number, what: string): Promise<T> {
  let timer: NodeJS.Timeout | undefined;
  const limit = new Promise<never>((_, reject) => {
    timer = setTimeout(
      () => reject(new AppError('unavailable', `${what} did not answer within ${limitMs} ms.`)),
      limitMs,
    );
  });
  try {
    return await Promise.race([work, limit]);
  } finally {
    clearTimeout(timer);
    // The loser may still fail later; that must not end the process as an unhandled rejection.
    work.catch(() => undefined);
  }
}
