import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const bucket = 'outfold';

/** What a child of Children needs to run the local S3 fake over `<dataDir>/objects` on 127.0.0.1:port, and its settings. */
export async function describeObjectStore({ dataDir, port, secrets }) {
  const folder = join(dataDir, 'objects');
  const endpoint = `http://127.0.0.1:${port}`;
  return {
    env: {
      S3_ENDPOINT: endpoint,
      S3_REGION: 'us-east-1',
      S3_BUCKET: bucket,
      S3_ACCESS_KEY: secrets.s3AccessKey,
      S3_SECRET_KEY: secrets.s3SecretKey,
    },
    child: {
      name: 'object-store',
      command: process.execPath,
      args: [fileURLToPath(new URL('object-store-server.mjs', import.meta.url))],
      cwd: dataDir,
      env: {
        FAKE_PORT: String(port),
        FAKE_FOLDER: folder,
        FAKE_BUCKET: bucket,
        FAKE_ACCESS_KEY: secrets.s3AccessKey,
        FAKE_SECRET_KEY: secrets.s3SecretKey,
      },
      restarts: true,
      prepare: () => mkdirSync(folder, { recursive: true, mode: 0o700 }),
      // Unsigned, so refused: any answer means that it serves.
      ready: async () =>
        (await fetch(`${endpoint}/${bucket}`, { signal: AbortSignal.timeout(2_000) })).status === 403,
    },
  };
}
