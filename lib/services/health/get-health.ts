import { connect } from 'node:net';
import { db } from '@/db/connection';
import type { Health } from '@/lib/contracts/health';
import { env } from '@/lib/env/env';
import { redis } from '@/lib/jobs/connection';
import { countWorkers } from '@/lib/jobs/worker-presence';
import { objectStore } from '@/storage/object-store';

const patienceMs = 2_500;

/** Whether each part that the product stands on answers within 2.5 s; ready only when all do. */
export async function getHealth(): Promise<Health> {
  const [database, queue, store, mail, worker] = await Promise.all([
    answers(async () => db().raw('select 1')),
    answers(async () => redis().ping()),
    answers(async () => objectStore().check()),
    answers(async () => reachMailServer()),
    answers(async () => {
      if ((await countWorkers()) === 0) throw new Error('no worker is alive');
    }),
  ]);
  const parts = { database, queue, store, mail, worker };
  return { state: Object.values(parts).every((part) => part === 'ready') ? 'ready' : 'notReady', parts };
}

async function answers(ask: () => Promise<unknown>): Promise<'ready' | 'away'> {
  let timer: NodeJS.Timeout | undefined;
  const tooLate = new Promise<never>((_resolve, reject) => {
    timer = setTimeout(() => reject(new Error('no answer in time')), patienceMs);
  });
  try {
    await Promise.race([ask(), tooLate]);
    return 'ready';
  } catch {
    return 'away';
  } finally {
    clearTimeout(timer);
  }
}

/** Opens a connection to the mail server and closes it again; no greeting, so that health checks leave no trace there. */
function reachMailServer(): Promise<void> {
  const url = new URL(env().SMTP_URL);
  const port = Number(url.port) || (url.protocol === 'smtps:' ? 465 : 587);
  return new Promise((resolve, reject) => {
    const socket = connect({ host: url.hostname, port, timeout: patienceMs });
    socket.once('connect', () => {
      socket.destroy();
      resolve();
    });
    socket.once('timeout', () => socket.destroy(new Error('no answer in time')));
    socket.once('error', reject);
  });
}
