import { randomBytes } from 'node:crypto';
import { chmodSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

const makers = {
  databasePassword: () => randomBytes(24).toString('hex'),
  databaseRootPassword: () => randomBytes(24).toString('hex'),
  redisPassword: () => randomBytes(24).toString('hex'),
  s3AccessKey: () => `OUTFOLD${randomBytes(8).toString('hex').toUpperCase()}`,
  s3SecretKey: () => randomBytes(24).toString('hex'),
  smtpPassword: () => randomBytes(24).toString('hex'),
  authSecret: () => randomBytes(48).toString('base64url'),
  // Typed by people: no letters or digits that look alike.
  demoPassword: () => {
    const letters = 'abcdefghjkmnpqrstuvwxyz23456789';
    const word = () => Array.from(randomBytes(5), (byte) => letters[byte % letters.length]).join('');
    return `${word()}-${word()}-${word()}`;
  },
};

/** The random secrets of a data folder, made once and kept in secrets.json, readable by its owner only. */
export function readSecrets(dataDir) {
  mkdirSync(dataDir, { recursive: true, mode: 0o700 });
  chmodSync(dataDir, 0o700);
  const path = join(dataDir, 'secrets.json');
  let known = {};
  try {
    known = JSON.parse(readFileSync(path, 'utf8'));
  } catch (error) {
    if (error.code !== 'ENOENT')
      throw new Error(
        `${path} cannot be read (${error.message}); restore it from a backup, the services need it`,
        {
          cause: error,
        },
      );
  }
  const secrets = Object.fromEntries(
    Object.entries(makers).map(([name, make]) => [name, known[name] ?? make()]),
  );
  if (JSON.stringify(known) !== JSON.stringify(secrets)) {
    writeFileSync(`${path}.new`, JSON.stringify(secrets, null, 2), { mode: 0o600 });
    renameSync(`${path}.new`, path);
  }
  chmodSync(path, 0o600);
  return secrets;
}
