import { S3Client } from '@aws-sdk/client-s3';
import type { Env } from '@/lib/env/env';

/**
 * The S3 client. Checksums only where the operation demands one: the default wraps bodies in trailing-checksum chunks,
 * which some S3-compatible stores (the local one among them) keep as part of the object. We hash contents ourselves.
 */
export function openClient(
  settings: Pick<Env, 'S3_ENDPOINT' | 'S3_REGION' | 'S3_ACCESS_KEY' | 'S3_SECRET_KEY'>,
): S3Client {
  return new S3Client({
    endpoint: settings.S3_ENDPOINT,
    region: settings.S3_REGION,
    forcePathStyle: true,
    credentials: { accessKeyId: settings.S3_ACCESS_KEY, secretAccessKey: settings.S3_SECRET_KEY },
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    maxAttempts: 3,
    // Failures are thrown; the client's own remarks go nowhere.
    logger: { trace: ignore, debug: ignore, info: ignore, warn: ignore, error: ignore },
    requestHandler: { connectionTimeout: 3_000, socketTimeout: 30_000 },
  });
}

function ignore(): void {}
