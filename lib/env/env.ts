import { resolve } from 'node:path';
import { z } from 'zod';

const port = z.coerce.number().int().min(1).max(65_535);
const urlOf = (...protocols: string[]) =>
  z
    .string()
    .refine(
      (value) => URL.canParse(value) && protocols.includes(new URL(value).protocol.slice(0, -1)),
      `must be an address that starts with ${protocols.map((name) => `${name}://`).join(' or ')}`,
    );

const envSchema = z
  .object({
    OUTFOLD_DATA: z.string().min(1).default('.data'),
    HOST: z.string().min(1).default('127.0.0.1'),
    PORT: port.default(3000),
    PUBLIC_URL: urlOf('http', 'https').optional(),
    DATABASE_URL: urlOf('mysql', 'mariadb'),
    REDIS_URL: urlOf('redis', 'rediss'),
    S3_ENDPOINT: urlOf('http', 'https'),
    S3_REGION: z.string().min(1).default('us-east-1'),
    S3_BUCKET: z.string().min(1).default('outfold'),
    S3_ACCESS_KEY: z.string().min(1),
    S3_SECRET_KEY: z.string().min(1),
    SMTP_URL: urlOf('smtp', 'smtps'),
    MAIL_FROM: z.string().min(3).default('Outfold <outfold@localhost>'),
    AUTH_SECRET: z.string().min(32, 'must hold at least 32 characters'),
    OUTFOLD_DEMO: z
      .enum(['0', '1', ''])
      .default('')
      .transform((value) => value === '1'),
    DEMO_PASSWORD: z.string().optional(),
    LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'),
  })
  .transform((values) => ({
    ...values,
    OUTFOLD_DATA: resolve(values.OUTFOLD_DATA),
    PUBLIC_URL: (values.PUBLIC_URL ?? `http://${values.HOST}:${values.PORT}`).replace(/\/+$/, ''),
  }));

/** The settings of this process, checked and with their defaults. */
export type Env = z.output<typeof envSchema>;

const names = Object.keys(envSchema.in.shape);
let known: { raw: string; values: Env } | undefined;

/**
 * The validated environment. Read on first use and kept while the variables stay as they are, so that importing
 * this module never fails (a build has no services). An empty variable counts as not set.
 *
 * @throws Error that names every variable that is missing or wrong; values are not repeated, they may be secret.
 */
export function env(): Env {
  const given = Object.fromEntries(names.map((name) => [name, process.env[name] || undefined]));
  const raw = JSON.stringify(given);
  if (known?.raw === raw) return known.values;
  const parsed = envSchema.safeParse(given);
  if (!parsed.success) {
    const faults = parsed.error.issues.map(
      ({ path, message }) =>
        `${path.join('.')}: ${given[String(path[0])] === undefined ? 'is not set' : message}`,
    );
    throw new Error(
      `The settings are not complete (npm start sets them all; docker-less-setup.md lists them):\n  ${faults.join('\n  ')}`,
    );
  }
  known = { raw, values: parsed.data };
  return parsed.data;
}
