import { rmSync } from 'node:fs';
import { createServer } from 'node:http';
import { join } from 'node:path';

/**
 * Lets tests stop and start the throw-away services. An HTTP server on a Unix socket that only its owner can open:
 * `GET /` lists name and pid; `POST /<name>/stop`, `/kill`, `/start`, `/restart`; `POST /redis/lose` kills Redis and
 * starts it empty. The answer comes when it is done.
 *
 * @returns {Promise<{ path: string, close: () => Promise<void> }>}
 */
export async function openControlSocket({ folder, children, emptyRedis }) {
  const path = join(folder, 'control.sock');
  rmSync(path, { force: true });
  const verbs = {
    stop: (name) => children.stop(name),
    kill: (name) => children.stop(name, 'SIGKILL'),
    start: (name) => children.restart(name),
    restart: (name) => children.restart(name),
    lose: async (name) => {
      if (name !== 'redis') throw new Error('only redis can lose its data');
      await children.stop(name, 'SIGKILL');
      emptyRedis();
      await children.restart(name);
    },
  };
  const server = createServer(async (request, response) => {
    const [, name, verb] = request.url.split('/');
    try {
      if (request.method === 'POST') {
        if (!Object.hasOwn(verbs, verb ?? '')) throw new Error(`no such verb: ${verb}`);
        await verbs[verb](name);
      }
      response.end(JSON.stringify(children.list()));
    } catch (error) {
      response.statusCode = 500;
      response.end(JSON.stringify({ message: error.message }));
    }
  });
  await new Promise((resolve, reject) => server.once('error', reject).listen(path, resolve));
  return {
    path,
    close: () =>
      new Promise((resolve) => {
        server.close(resolve);
        server.closeAllConnections();
      }),
  };
}
