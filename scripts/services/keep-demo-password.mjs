import { renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** The password of the demonstration sign-ins: the given one, which is then kept, or the one kept from before. */
export function keepDemoPassword({ dataDir, secrets, given }) {
  if (!given || given === secrets.demoPassword) return secrets.demoPassword;
  const path = join(dataDir, 'secrets.json');
  writeFileSync(`${path}.new`, JSON.stringify({ ...secrets, demoPassword: given }, null, 2), { mode: 0o600 });
  renameSync(`${path}.new`, path);
  return given;
}
