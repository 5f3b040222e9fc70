import type { Readable } from 'node:stream';
import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  DeleteObjectCommand,
  GetObjectCommand,
  HeadBucketCommand,
  HeadObjectCommand,
  PutObjectCommand,
  UploadPartCommand,
  type S3Client,
} from '@aws-sdk/client-s3';
import { env } from '@/lib/env/env';
import { log } from '@/lib/log/log';
import { openClient } from '@/storage/open-client';
import { withBody, type Body } from '@/storage/with-body';
import { RangeOutside } from '@/storage/range-outside';
import { storeErrorFrom } from '@/storage/store-error-from';

/**
 * The bucket, by key (see keys.ts). Everything throws ObjectMissing where an object was expected and is not there, and
 * AppError('unavailable') while the store is away. A body given as a stream is read once and never held whole in memory;
 * `sizeBytes` must be its exact length: another length, or a stream that breaks off, rejects and leaves nothing behind.
 */
export interface ObjectStore {
  put(key: string, bytes: Uint8Array, contentType?: string): Promise<void>;
  putStream(key: string, body: Body, sizeBytes: number, contentType?: string): Promise<void>;
  getBytes(key: string): Promise<Uint8Array>;
  /** Exactly `length` bytes from `offset`; throws RangeOutside when the object is shorter. */
  getRange(key: string, offset: number, length: number): Promise<Uint8Array>;
  getStream(key: string): Promise<Readable>;
  head(key: string): Promise<{ sizeBytes: number } | null>;
  /** Quiet when nothing is there. */
  remove(key: string): Promise<void>;
  createMultipart(key: string, contentType?: string): Promise<string>;
  /** Part numbers run from 1; every part but the last needs at least 5 MiB on a real S3. Returns the part's ETag. */
  uploadPart(key: string, uploadId: string, number: number, body: Body, sizeBytes: number): Promise<string>;
  completeMultipart(key: string, uploadId: string, parts: { number: number; etag: string }[]): Promise<void>;
  /** Never throws for an upload that is gone or a store that cannot abort; the bucket's lifecycle rule clears the rest. */
  abortMultipart(key: string, uploadId: string): Promise<void>;
  /** Resolves when the bucket answers; for health checks. */
  check(): Promise<void>;
}

const shared = globalThis as typeof globalThis & { outfoldStore?: { key: string; store: ObjectStore } };

/** The object store of this process, made from the settings on first use. */
export function objectStore(): ObjectStore {
  const settings = env();
  const key = [settings.S3_ENDPOINT, settings.S3_BUCKET, settings.S3_ACCESS_KEY].join(' ');
  if (shared.outfoldStore?.key !== key)
    shared.outfoldStore = { key, store: openStore(openClient(settings), settings.S3_BUCKET) };
  return shared.outfoldStore.store;
}

function openStore(client: S3Client, bucket: string): ObjectStore {
  async function attempt<T>(key: string, work: () => Promise<T>): Promise<T> {
    try {
      return await work();
    } catch (error) {
      throw storeErrorFrom(error, key);
    }
  }
  const at = (key: string) => ({ Bucket: bucket, Key: key });

  const store: ObjectStore = {
    put: (key, bytes, contentType = 'application/octet-stream') =>
      attempt(key, async () => {
        await client.send(new PutObjectCommand({ ...at(key), Body: bytes, ContentType: contentType }));
      }),

    putStream: (key, body, sizeBytes, contentType = 'application/octet-stream') =>
      attempt(key, async () => {
        await withBody(body, sizeBytes, (Body, abortSignal) =>
          client.send(
            new PutObjectCommand({ ...at(key), Body, ContentLength: sizeBytes, ContentType: contentType }),
            { abortSignal },
          ),
        );
      }),

    getBytes: (key) =>
      attempt(key, async () => {
        const { Body } = await client.send(new GetObjectCommand(at(key)));
        return Body!.transformToByteArray();
      }),

    getRange: (key, offset, length) =>
      attempt(key, async () => {
        if (!Number.isSafeInteger(offset) || !Number.isSafeInteger(length) || offset < 0 || length < 0)
          throw new RangeError(`not a byte range: ${length} from ${offset}`);
        if (length === 0) return new Uint8Array(0);
        try {
          const Range = `bytes=${offset}-${offset + length - 1}`;
          const { Body } = await client.send(new GetObjectCommand({ ...at(key), Range }));
          const bytes = await Body!.transformToByteArray();
          if (bytes.length !== length) throw new RangeOutside(key, offset, length);
          return bytes;
        } catch (error) {
          if (error instanceof Error && error.name === 'InvalidRange')
            throw new RangeOutside(key, offset, length, { cause: error });
          throw error;
        }
      }),

    getStream: (key) =>
      attempt(key, async () => {
        const { Body } = await client.send(new GetObjectCommand(at(key)));
        return Body as Readable;
      }),

    head: (key) =>
      attempt(key, async () => {
        try {
          const { ContentLength } = await client.send(new HeadObjectCommand(at(key)));
          return { sizeBytes: ContentLength ?? 0 };
        } catch (error) {
          if (error instanceof Error && (error.name === 'NotFound' || error.name === 'NoSuchKey'))
            return null;
          throw error;
        }
      }),

    remove: (key) =>
      attempt(key, async () => {
        await client.send(new DeleteObjectCommand(at(key)));
      }),

    createMultipart: (key, contentType = 'application/octet-stream') =>
      attempt(key, async () => {
        const { UploadId } = await client.send(
          new CreateMultipartUploadCommand({ ...at(key), ContentType: contentType }),
        );
        return UploadId!;
      }),

    uploadPart: (key, uploadId, number, body, sizeBytes) =>
      attempt(key, async () => {
        const { ETag } = await withBody(body, sizeBytes, (Body, abortSignal) =>
          client.send(
            new UploadPartCommand({
              ...at(key),
              UploadId: uploadId,
              PartNumber: number,
              Body,
              ContentLength: sizeBytes,
            }),
            { abortSignal },
          ),
        );
        return ETag!;
      }),

    completeMultipart: (key, uploadId, parts) =>
      attempt(key, async () => {
        const Parts = [...parts]
          .sort((a, b) => a.number - b.number)
          .map(({ number, etag }) => ({ PartNumber: number, ETag: etag }));
        await client.send(
          new CompleteMultipartUploadCommand({ ...at(key), UploadId: uploadId, MultipartUpload: { Parts } }),
        );
      }),

    abortMultipart: async (key, uploadId) => {
      try {
        await client.send(new AbortMultipartUploadCommand({ ...at(key), UploadId: uploadId }));
      } catch (error) {
        log.warn({ key, err: error }, 'An unfinished upload could not be removed from the object store');
      }
    },

    check: () =>
      attempt('', async () => {
        await client.send(new HeadBucketCommand({ Bucket: bucket }));
      }),
  };
  return store;
}
