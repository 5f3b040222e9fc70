import { AppError } from '@/lib/errors/app-error';

const awayCodes = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'ECONNABORTED',
  'EPIPE',
  'ETIMEDOUT',
  'EHOSTUNREACH',
  'ENETUNREACH',
  'ENOTFOUND',
  'ENOENT',
  'EAI_AGAIN',
  'PROTOCOL_CONNECTION_LOST',
  'PROTOCOL_SEQUENCE_TIMEOUT',
  'ER_CON_COUNT_ERROR',
  'ER_SERVER_SHUTDOWN',
  'ER_CONNECTION_KILLED',
  'ER_DISK_FULL',
  'ER_ACCESS_DENIED_ERROR',
  'ER_BAD_DB_ERROR',
]);

/** AppError('unavailable') when the driver's or pool's error means that the database cannot be used now, else undefined. */
export function unavailableFrom(error: unknown): AppError | undefined {
  if (!(error instanceof Error) || error instanceof AppError) return undefined;
  const { code, fatal } = error as Error & { code?: unknown; fatal?: unknown };
  const isAway =
    (typeof code === 'string' && awayCodes.has(code)) ||
    fatal === true ||
    error.name === 'KnexTimeoutError' ||
    error.name === 'TimeoutError' ||
    /closed state|aborted|Connection lost|Unable to acquire a connection/i.test(error.message);
  if (!isAway) return undefined;
  return new AppError(
    'unavailable',
    'The database cannot be reached. Nothing was changed; try again shortly.',
    {
      cause: error,
      retryAfterSeconds: 5,
    },
  );
}
