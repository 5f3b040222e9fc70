import { Children, stopLeftovers } from './children.mjs';
import { lockInstance } from './instance-lock.mjs';
import { describeMail } from './mail.mjs';
import { describeMariadb } from './mariadb.mjs';
import { describeObjectStore } from './object-store.mjs';
import { freePort } from './ports.mjs';
import { describeRedis } from './redis.mjs';
import { readSecrets } from './secrets.mjs';

/**
 * Starts the services that the settings do not name: MariaDB without DATABASE_URL, Redis without REDIS_URL, the S3 fake
 * without S3_ENDPOINT, the mail fake without SMTP_URL. All listen on 127.0.0.1 on free ports and keep their data in
 * `dataDir`, which this process locks.
 *
 * @param {{ dataDir: string, settings: NodeJS.ProcessEnv, throwAway?: boolean, say?: (line: string) => void,
 *   onGivenUp?: (error: Error) => void }} options
 * @returns {Promise<{ env: Record<string, string>, isAllLocal: boolean, secrets: object, children: Children,
 *   emptyRedis: (() => void) | undefined, stop: () => Promise<void> }>} `env` completes the settings
 */
export async function startLocalServices({
  dataDir,
  settings,
  throwAway = false,
  say = () => {},
  onGivenUp,
}) {
  const secrets = readSecrets(dataDir);
  const unlock = lockInstance(dataDir);
  const children = new Children(dataDir, { onGivenUp });
  const stop = async () => {
    await children.stopAll();
    unlock();
  };
  try {
    const leftovers = await stopLeftovers(dataDir);
    if (leftovers.length > 0) say(`Stopped what an earlier run had left: ${leftovers.join(', ')}.`);
    const env = {
      OUTFOLD_DATA: dataDir,
      // The client would warn on every start that it will ask for a newer Node some day.
      AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
      AUTH_SECRET: settings.AUTH_SECRET || secrets.authSecret,
    };
    const options = async () => ({ dataDir, secrets, throwAway, port: await freePort() });
    const kinds = [
      ['DATABASE_URL', describeMariadb],
      ['REDIS_URL', describeRedis],
      ['S3_ENDPOINT', describeObjectStore],
      ['SMTP_URL', describeMail],
    ];
    let emptyRedis;
    for (const [name, describe] of kinds) {
      if (settings[name]) continue;
      // A free port may be taken by somebody else before the service has it; another one is then tried.
      for (let tried = 1; ; tried++) {
        const service = await describe(await options());
        try {
          await children.start(service.child);
          Object.assign(env, service.env ?? { [name]: service.url });
          emptyRedis ??= service.empty;
          break;
        } catch (error) {
          if (tried === 3 || !/in use|EADDRINUSE/i.test(error.message)) throw error;
        }
      }
    }
    return { env, isAllLocal: kinds.every(([name]) => !settings[name]), secrets, children, emptyRedis, stop };
  } catch (error) {
    await stop();
    throw error;
  }
}
