import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { connect } from 'node:net';
import { join } from 'node:path';
import { findCommand } from './find-command.mjs';

/**
 * What a child of Children needs to run an own Redis in `<dataDir>/redis` on 127.0.0.1:port, and its address. The
 * settings go into a file of mode 600, because a command line is open to every user of the machine.
 */
export async function describeRedis({ dataDir, port, secrets }) {
  const server = findCommand('redis-server');
  if (!server) throw new Error('redis-server is not installed (Debian package redis-server)');
  const folder = join(dataDir, 'redis');
  const configFile = join(dataDir, 'run', 'redis.conf');
  return {
    url: `redis://:${secrets.redisPassword}@127.0.0.1:${port}/0`,
    /** Empties the data of a stopped Redis: for tests that lose it on purpose. */
    empty: () => rmSync(folder, { recursive: true, force: true }),
    child: {
      name: 'redis',
      command: server,
      args: [configFile],
      cwd: dataDir,
      restarts: true,
      prepare: () => {
        mkdirSync(folder, { recursive: true, mode: 0o700 });
        writeFileSync(
          configFile,
          [
            `port ${port}`,
            'bind 127.0.0.1',
            'protected-mode yes',
            'daemonize no',
            `dir ${JSON.stringify(folder)}`,
            `requirepass ${secrets.redisPassword}`,
            'appendonly yes',
            'appendfsync everysec',
            'save ""',
            'maxmemory-policy noeviction',
            '',
          ].join('\n'),
          { mode: 0o600 },
        );
      },
      ready: () => answersPing(port, secrets.redisPassword),
    },
  };
}

function answersPing(port, password) {
  return new Promise((resolve, reject) => {
    const socket = connect({ port, host: '127.0.0.1' });
    let answer = '';
    socket.setTimeout(2_000, () => socket.destroy(new Error('no answer')));
    socket.once('error', reject);
    socket.once('connect', () => socket.write(`AUTH ${password}\r\nPING\r\n`));
    socket.on('data', (bytes) => {
      answer += bytes;
      if (answer.includes('+PONG')) resolve(true);
      // While it loads its append-only file it answers -LOADING.
      else if (/^-/m.test(answer)) reject(new Error(answer.trim()));
      else return;
      socket.destroy();
    });
  });
}
