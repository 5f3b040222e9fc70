import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { stopLeftovers } from './children.mjs';
import { openControlSocket } from './control-socket.mjs';
import { startLocalServices } from './local-services.mjs';
import { isRunning } from './process-identity.mjs';
import { runMigrations } from './run-migrations.mjs';

const prefix = 'outfold-test-';

/**
 * Own services for tests: in a new folder under the system's temporary one, on free ports, migrated, with a control
 * socket (OUTFOLD_CONTROL). Settings for outside services are ignored, so a test never touches real data. `stop`
 * removes the folder.
 */
export async function startThrowAway({ root, say = console.error, migrates = true }) {
  await removeAbandoned();
  const dataDir = mkdtempSync(join(tmpdir(), prefix));
  const services = await startLocalServices({
    dataDir,
    settings: {},
    throwAway: true,
    onGivenUp: (error) => say(error.message),
  }).catch((error) => {
    rmSync(dataDir, { recursive: true, force: true });
    throw error;
  });
  const { children, emptyRedis } = services;
  let control;
  const stop = async () => {
    await control?.close();
    await services.stop();
    if (process.env.OUTFOLD_KEEP_TEST_DATA) say(`The test data stay in ${dataDir}`);
    else rmSync(dataDir, { recursive: true, force: true });
  };
  try {
    control = await openControlSocket({ folder: dataDir, children, emptyRedis });
    const env = {
      ...services.env,
      OUTFOLD_CONTROL: control.path,
      LOG_LEVEL: process.env.LOG_LEVEL || 'error',
    };
    if (migrates) await runMigrations({ root, env });
    return { env, dataDir, children, secrets: services.secrets, stop };
  } catch (error) {
    await stop();
    throw error;
  }
}

/** Clears up after test runs that were killed: their services are stopped and their folders removed. */
async function removeAbandoned() {
  for (const name of readdirSync(tmpdir())) {
    if (!name.startsWith(prefix)) continue;
    const folder = join(tmpdir(), name);
    const note = join(folder, 'run', 'supervisor.json');
    try {
      if (statSync(folder).uid !== process.getuid() || !existsSync(note)) continue;
      if (isRunning(JSON.parse(readFileSync(note, 'utf8')))) continue;
      await stopLeftovers(folder);
      rmSync(folder, { recursive: true, force: true });
    } catch {
      // Another run clears it up at the same moment.
    }
  }
}
