import { AppError } from '@/lib/errors/app-error';
import { ObjectMissing } from '@/storage/object-missing';

const missingNames = new Set(['NoSuchKey', 'NotFound', 'NoSuchUpload']);
const awayNames = new Set([
  'TimeoutError',
  'NetworkingError',
  'RequestTimeout',
  'SlowDown',
  'ServiceUnavailable',
  'InternalError',
  'NoSuchBucket',
  'AccessDenied',
  'InvalidAccessKeyId',
  'SignatureDoesNotMatch',
]);

/**
 * What an error of the S3 client means to us: ObjectMissing, AppError('unavailable') when the store cannot be used now
 * (away, overloaded, or refusing our keys or bucket: the cause goes to the log), or the error itself.
 */
export function storeErrorFrom(error: unknown, key: string): unknown {
  if (!(error instanceof Error) || error instanceof AppError || error instanceof ObjectMissing) return error;
  const { name } = error;
  const { code, $metadata } = error as Error & { code?: string; $metadata?: { httpStatusCode?: number } };
  const status = $metadata?.httpStatusCode;
  if (missingNames.has(name) || (status === 404 && name !== 'NoSuchBucket'))
    return new ObjectMissing(key, { cause: error });
  const isNetwork = typeof code === 'string' && /^(E[A-Z_]+|UND_ERR_.*)$/.test(code);
  if (isNetwork || awayNames.has(name) || (status !== undefined && status >= 500))
    return new AppError(
      'unavailable',
      'The object store cannot be reached. Nothing is lost; try again shortly.',
      {
        cause: error,
        retryAfterSeconds: 5,
      },
    );
  return error;
}
