import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('.', import.meta.url));

/** @type {import('next').NextConfig} */
export default {
  // One folder for each state of the sources: see scripts/services/build.mjs.
  distDir: process.env.OUTFOLD_DIST || '.next',
  poweredByHeader: false,
  reactStrictMode: true,
  // Loaded by Node as they are: native parts, drivers, and what keeps state in its own module.
  serverExternalPackages: [
    'knex',
    'mysql2',
    'bullmq',
    'ioredis',
    'argon2',
    'nodemailer',
    'koffi',
    'h5wasm',
    'pino',
    '@aws-sdk/client-s3',
  ],
  turbopack: { root },
  typescript: {
    // A configuration that only extends the real one, because Next rewrites the file that it is given.
    tsconfigPath: 'tsconfig.next.json',
    // npm run check does it.
    ignoreBuildErrors: true,
  },
};
