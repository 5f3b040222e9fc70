import pino from 'pino';

const secretNames = [
  'password',
  'newPassword',
  'oldPassword',
  'passwordHash',
  'password_hash',
  'token',
  'tokenHash',
  'token_hash',
  'secret',
  'authorization',
  'Authorization',
  'cookie',
  'Cookie',
  'set-cookie',
  'Set-Cookie',
  'AUTH_SECRET',
  'DATABASE_URL',
  'REDIS_URL',
  'SMTP_URL',
  'S3_SECRET_KEY',
  'DEMO_PASSWORD',
];
const depths = ['', '*.', '*.*.', '*.*.*.'];

/**
 * The one logger: JSON lines on standard output, `log.info({ sessionId }, 'what happened')`.
 * Passwords, tokens, cookies and authorization headers are cut out of logged objects down to four levels;
 * never put a secret into the message itself. Reads only LOG_LEVEL, so it works before the settings are checked.
 */
export const log = pino({
  level: process.env.LOG_LEVEL || 'info',
  base: { pid: process.pid },
  timestamp: pino.stdTimeFunctions.isoTime,
  formatters: { level: (label) => ({ level: label }) },
  redact: {
    paths: depths.flatMap((depth) =>
      secretNames.map((name) =>
        name.includes('-') ? `${depth.replace(/\.$/, '')}["${name}"]` : `${depth}${name}`,
      ),
    ),
    censor: '[cut]',
  },
});
