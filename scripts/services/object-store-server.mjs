/**
 * The local S3 fake: s3rver over a folder, made fit for daily use where it falls short. Started by object-store.mjs.
 * - Every request must carry a valid AWS Signature Version 4 of our one key pair (s3rver accepts unsigned ones).
 * - An object appears only when all of its bytes are on disk, and a broken upload leaves the old one (s3rver answers
 *   before its file is flushed and writes in place).
 * - `bytes=0-0` gives one byte, and an unfinished multipart upload can be aborted.
 * It is still a fake: one disk, no replication, no versions. docker-less-setup.md says how to use a real store.
 */
import { createHash, createHmac, randomBytes, timingSafeEqual } from 'node:crypto';
import { createReadStream, createWriteStream } from 'node:fs';
import { mkdir, open, rename, rm, writeFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { Readable, Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';

const require = createRequire(import.meta.url);
const S3rver = require('s3rver');
const account = require('s3rver/lib/models/account.js');
const S3Object = require('s3rver/lib/models/object.js');

const { FAKE_PORT, FAKE_FOLDER, FAKE_BUCKET, FAKE_ACCESS_KEY, FAKE_SECRET_KEY } = process.env;
account.DUMMY_ACCOUNT.revokeAccessKey('S3RVER');
account.DUMMY_ACCOUNT.createKeyPair(FAKE_ACCESS_KEY, FAKE_SECRET_KEY);

const server = new S3rver({
  address: '127.0.0.1',
  port: Number(FAKE_PORT),
  silent: true,
  directory: FAKE_FOLDER,
  vhostBuckets: false,
  allowMismatchedSignatures: false,
  configureBuckets: [{ name: FAKE_BUCKET, configs: [] }],
});
const { store } = server;

store.putObject = async (object) => {
  const path = store.getResourcePath(object.bucket, object.key, 'object');
  const { size, md5 } = await writeWhole(path, object.content);
  await store.putMetadata(object.bucket, object.key, object.metadata, md5);
  return { size, md5 };
};

store.putPart = async (bucket, uploadId, partNumber, content) => {
  const path = join(store.getResourcePath(bucket, undefined, 'uploads'), uploadId, String(partNumber));
  const { size, md5 } = await writeWhole(path, content);
  await writeFile(`${path}.md5`, md5);
  return { size, md5 };
};

store.getObject = async (bucket, key, options) => {
  try {
    const metadata = await store.getMetadata(bucket, key);
    const lastByte = Number(metadata['content-length']) - 1;
    const start = options?.start ?? 0;
    const end = Math.min(options?.end ?? Infinity, lastByte);
    const isRange = options?.start !== undefined;
    const object = new S3Object(bucket, key, null, metadata);
    if (isRange) object.range = { start, end };
    if (end < start) {
      if (!isRange) object.content = Readable.from([]);
      return object;
    }
    const stream = createReadStream(store.getResourcePath(bucket, key, 'object'), { start, end });
    await new Promise((resolve, reject) => stream.once('open', resolve).once('error', reject));
    object.content = stream;
    return object;
  } catch (error) {
    if (error.code === 'ENOENT') return null;
    throw error;
  }
};

// Ahead of s3rver's own middleware.
server.middleware.unshift(async (ctx, next) => {
  if (!isSigned(ctx.req)) {
    ctx.status = 403;
    ctx.type = 'application/xml';
    ctx.body =
      '<Error><Code>SignatureDoesNotMatch</Code><Message>The signature is missing or wrong.</Message></Error>';
    return;
  }
  if (ctx.method === 'DELETE' && typeof ctx.query.uploadId === 'string') {
    const uploadId = ctx.query.uploadId;
    if (/^[0-9a-zA-Z_-]+$/.test(uploadId))
      await rm(join(store.getResourcePath(FAKE_BUCKET, undefined, 'uploads'), uploadId), {
        recursive: true,
        force: true,
      });
    ctx.status = 204;
    return;
  }
  await next();
});

async function writeWhole(path, content) {
  await mkdir(dirname(path), { recursive: true });
  const part = `${path}.${randomBytes(6).toString('hex')}.part`;
  const hash = createHash('md5');
  let size = 0;
  const meter = new Transform({
    transform(chunk, encoding, callback) {
      hash.update(chunk);
      size += chunk.length;
      callback(null, chunk);
    },
  });
  try {
    await pipeline(
      Buffer.isBuffer(content) ? Readable.from([content]) : content,
      meter,
      createWriteStream(part),
    );
    const file = await open(part, 'r');
    await file.sync();
    await file.close();
    await rename(part, path);
  } catch (error) {
    await rm(part, { force: true });
    throw error;
  }
  return { size, md5: hash.digest('hex') };
}

/** AWS Signature Version 4 in the Authorization header; the body is covered as far as x-amz-content-sha256 is. */
function isSigned(req) {
  const match =
    /^AWS4-HMAC-SHA256 Credential=([^/]+)\/(\d{8})\/([^/]+)\/s3\/aws4_request, ?SignedHeaders=([^,]+), ?Signature=([0-9a-f]{64})$/.exec(
      req.headers.authorization ?? '',
    );
  if (!match) return false;
  const [, accessKey, day, region, signedHeaders, signature] = match;
  const time = req.headers['x-amz-date'];
  if (accessKey !== FAKE_ACCESS_KEY || !time?.startsWith(day)) return false;
  const names = signedHeaders.split(';');
  if (!names.includes('host') || !names.includes('x-amz-date')) return false;
  const url = new URL(req.url, 'http://local');
  const escape = (text) =>
    encodeURIComponent(text).replace(/[!'()*]/g, (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`);
  const query = [...url.searchParams]
    .map(([name, value]) => `${escape(name)}=${escape(value)}`)
    .sort()
    .join('&');
  const canonical = [
    req.method,
    url.pathname,
    query,
    ...names.map(
      (name) =>
        `${name}:${String(req.headers[name] ?? '')
          .trim()
          .replace(/ +/g, ' ')}`,
    ),
    '',
    signedHeaders,
    req.headers['x-amz-content-sha256'] ?? 'UNSIGNED-PAYLOAD',
  ].join('\n');
  const toSign = [
    'AWS4-HMAC-SHA256',
    time,
    `${day}/${region}/s3/aws4_request`,
    createHash('sha256').update(canonical).digest('hex'),
  ].join('\n');
  const hmac = (key, text) => createHmac('sha256', key).update(text).digest();
  const key = [day, region, 's3', 'aws4_request'].reduce(hmac, `AWS4${FAKE_SECRET_KEY}`);
  return timingSafeEqual(hmac(key, toSign), Buffer.from(signature, 'hex'));
}

try {
  await server.run();
} catch (error) {
  console.error(error);
  process.exit(1);
}
console.log(`S3 fake on 127.0.0.1:${FAKE_PORT}`);
for (const signal of ['SIGTERM', 'SIGINT'])
  process.on(signal, () => {
    server.httpServer.close(() => process.exit(0));
    server.httpServer.closeIdleConnections();
    setTimeout(() => process.exit(0), 2_000).unref();
  });
