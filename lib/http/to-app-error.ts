import { AppError } from '@/lib/errors/app-error';

const awayCodes = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'EHOSTUNREACH',
  'ENOTFOUND',
  'EPIPE',
  'ETIMEDOUT',
  'EAI_AGAIN',
  'PROTOCOL_CONNECTION_LOST',
  'ER_CON_COUNT_ERROR',
  'ER_SERVER_SHUTDOWN',
  'ER_CONNECTION_KILLED',
]);

/** An expected error as it is; a part of the service that cannot be reached as `unavailable`; the rest as `internal`. */
export function toAppError(error: unknown): AppError {
  if (error instanceof AppError) return error;
  for (
    let cause: unknown = error, depth = 0;
    cause instanceof Error && depth < 5;
    cause = cause.cause, depth++
  ) {
    if (cause instanceof AppError) return cause;
    const code = 'code' in cause && typeof cause.code === 'string' ? cause.code : '';
    if (
      awayCodes.has(code) ||
      cause.name === 'KnexTimeoutError' ||
      cause.name === 'MaxRetriesPerRequestError'
    )
      return new AppError(
        'unavailable',
        'A part of the service cannot be reached just now. Try again shortly.',
        {
          cause: error,
        },
      );
  }
  return new AppError(
    'internal',
    'Something went wrong on our side. It has been logged under this request id.',
    {
      cause: error,
    },
  );
}
