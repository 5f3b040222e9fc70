import { createHash, randomBytes } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ObjectMissing } from '@/storage/object-missing';
import { objectStore } from '@/storage/object-store';
import { RangeOutside } from '@/storage/range-outside';
import { control } from '@/tests/support/control';
import { requireServices } from '@/tests/support/services';

const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');
const mebibyte = 1024 * 1024;

describe('the object store', () => {
  beforeAll(requireServices);

  it('gives back the very bytes that were put, whole and by range', async () => {
    const bytes = randomBytes(300_000);
    await objectStore().put('labs/a/whole', bytes, 'application/x-test');
    expect(sha256(await objectStore().getBytes('labs/a/whole'))).toBe(sha256(bytes));
    expect(await objectStore().head('labs/a/whole')).toEqual({ sizeBytes: 300_000 });
    for (const [offset, length] of [
      [0, 1],
      [0, 10],
      [299_999, 1],
      [1_234, 70_000],
      [0, 300_000],
    ] as const)
      expect(Buffer.from(await objectStore().getRange('labs/a/whole', offset, length))).toEqual(
        bytes.subarray(offset, offset + length),
      );
    expect(await objectStore().getRange('labs/a/whole', 5, 0)).toHaveLength(0);
    await expect(objectStore().getRange('labs/a/whole', 299_999, 2)).rejects.toBeInstanceOf(RangeOutside);
    await expect(objectStore().getRange('labs/a/whole', 300_000, 1)).rejects.toBeInstanceOf(RangeOutside);
  });

  it('takes a stream of known size from Node and from the web, and an empty object', async () => {
    const bytes = randomBytes(2 * mebibyte);
    const pieces = [bytes.subarray(0, 700_000), bytes.subarray(700_000)];
    await objectStore().putStream('labs/a/node', Readable.from(pieces), bytes.length);
    await objectStore().putStream('labs/a/web', new Blob([bytes]).stream(), bytes.length);
    for (const key of ['labs/a/node', 'labs/a/web']) {
      const read: Buffer[] = [];
      for await (const piece of await objectStore().getStream(key)) read.push(piece as Buffer);
      expect(sha256(Buffer.concat(read))).toBe(sha256(bytes));
    }
    await objectStore().put('labs/a/empty', new Uint8Array(0));
    expect(await objectStore().getBytes('labs/a/empty')).toHaveLength(0);
  });

  it('joins parts by number whatever order they came in, with a part sent twice', async () => {
    const parts = [randomBytes(5 * mebibyte), randomBytes(5 * mebibyte), randomBytes(1_000)];
    const key = 'labs/a/parts';
    const uploadId = await objectStore().createMultipart(key);
    const send = (number: number, bytes: Uint8Array) =>
      objectStore().uploadPart(key, uploadId, number, Readable.from([bytes]), bytes.length);
    const third = await send(3, parts[2]);
    await send(1, randomBytes(5 * mebibyte));
    const second = await send(2, parts[1]);
    const first = await send(1, parts[0]);
    expect(await objectStore().head(key)).toBeNull();
    await objectStore().completeMultipart(key, uploadId, [
      { number: 3, etag: third },
      { number: 1, etag: first },
      { number: 2, etag: second },
    ]);
    expect(sha256(await objectStore().getBytes(key))).toBe(sha256(Buffer.concat(parts)));
  });

  it('aborts an upload without touching the object of that key', async () => {
    const key = 'labs/a/kept';
    await objectStore().put(key, Buffer.from('before'));
    const uploadId = await objectStore().createMultipart(key);
    await objectStore().uploadPart(key, uploadId, 1, Buffer.from('never'), 5);
    await objectStore().abortMultipart(key, uploadId);
    await expect(
      objectStore()
        .uploadPart(key, uploadId, 2, Buffer.from('x'), 1)
        .then((etag) => objectStore().completeMultipart(key, uploadId, [{ number: 2, etag }])),
    ).rejects.toThrow();
    expect(Buffer.from(await objectStore().getBytes(key)).toString()).toBe('before');
  });

  it('tells a missing object from an empty one, and removes quietly', async () => {
    await expect(objectStore().getBytes('labs/a/nothing')).rejects.toBeInstanceOf(ObjectMissing);
    await expect(objectStore().getRange('labs/a/nothing', 0, 1)).rejects.toBeInstanceOf(ObjectMissing);
    expect(await objectStore().head('labs/a/nothing')).toBeNull();
    await objectStore().put('labs/a/gone', Buffer.from('x'));
    await objectStore().remove('labs/a/gone');
    await objectStore().remove('labs/a/gone');
    expect(await objectStore().head('labs/a/gone')).toBeNull();
  });

  it('keeps nothing of an upload that breaks off', async () => {
    const key = 'labs/a/broken';
    await objectStore().put(key, Buffer.from('before'));
    async function* breaking() {
      yield randomBytes(mebibyte);
      throw new Error('the browser went away');
    }
    const began = Date.now();
    await expect(objectStore().putStream(key, Readable.from(breaking()), 3 * mebibyte)).rejects.toThrow(
      'the browser went away',
    );
    for (const claimed of [999, 1_001])
      await expect(
        objectStore().putStream(key, Readable.from([randomBytes(1_000)]), claimed),
      ).rejects.toMatchObject({ code: 'malformed-request' });
    expect(Date.now() - began).toBeLessThan(5_000);
    expect(Buffer.from(await objectStore().getBytes(key)).toString()).toBe('before');
  });

  it('refuses requests without our signature', async () => {
    const endpoint = process.env.S3_ENDPOINT!;
    await objectStore().put('labs/a/secret', Buffer.from('x'));
    const url = `${endpoint}/${process.env.S3_BUCKET}/labs/a/secret`;
    expect((await fetch(url)).status).toBe(403);
    expect((await fetch(url, { method: 'DELETE' })).status).toBe(403);
    const unsigned =
      `AWS4-HMAC-SHA256 Credential=${process.env.S3_ACCESS_KEY}/20260101/us-east-1/s3/aws4_request, ` +
      `SignedHeaders=host;x-amz-date, Signature=${'0'.repeat(64)}`;
    const forged = { authorization: unsigned, 'x-amz-date': '20260101T000000Z' };
    expect((await fetch(url, { headers: forged })).status).toBe(403);
    expect(readFileSync(join(process.env.OUTFOLD_DATA!, 'secrets.json'), 'utf8')).toContain('s3SecretKey');
  });

  describe('while it is away', () => {
    beforeAll(() => control('object-store', 'stop'));
    afterAll(() => control('object-store', 'start'));

    it('says so', async () => {
      await expect(objectStore().getBytes('labs/a/whole')).rejects.toMatchObject({ code: 'unavailable' });
      await expect(objectStore().put('labs/a/whole', Buffer.from('x'))).rejects.toMatchObject({
        code: 'unavailable',
      });
      await expect(objectStore().head('labs/a/whole')).rejects.toMatchObject({ code: 'unavailable' });
      await expect(objectStore().check()).rejects.toMatchObject({ code: 'unavailable' });
    });
  });

  it('is back with what it held', async () => {
    expect(await objectStore().head('labs/a/whole')).toEqual({ sizeBytes: 300_000 });
  });
});
