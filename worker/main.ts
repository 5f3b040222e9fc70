import { randomBytes } from 'node:crypto';
import os from 'node:os';
import { closeDb } from '@/db/connection';
import { closeRedis } from '@/lib/jobs/connection';
import { consume, type Consumer } from '@/lib/jobs/consume';
import { jobDefinitions } from '@/lib/jobs/definitions';
import { closeQueues } from '@/lib/jobs/queues';
import { finishQueue, partQueue } from '@/lib/jobs/readout-flow';
import { within } from '@/lib/jobs/within';
import { announceWorker, withdrawWorker } from '@/lib/jobs/worker-presence';
import { log } from '@/lib/log/log';
import { forgetOldKeys } from '@/lib/services/upkeep/forget-old-keys';
import { forgetSent } from '@/lib/services/outbox/forget-sent';
import { sendWaitingMails } from '@/lib/services/mails/send-waiting-mails';
import { reconcileWork } from '@/lib/services/outbox/reconcile-work';
import { relayOutbox } from '@/lib/services/outbox/relay-outbox';
import { computePool } from '@/worker/compute/compute-pool';
import { finishSpreadReadout } from '@/worker/handlers/finish-readout';
import { readFile } from '@/worker/handlers/read-file';
import { runIntake } from '@/worker/handlers/run-intake';
import { runReadout } from '@/worker/handlers/run-readout';
import { runReadoutPart } from '@/worker/handlers/run-readout-part';
import { repeat } from '@/worker/repeat';
import { workerSettings } from '@/worker/settings';

/*
 * The worker: takes jobs, relays the outbox, and looks for lost work. More of them on more machines need nothing but
 * the same settings.
 */
const settings = workerSettings();
const workerId = `${os.hostname().slice(0, 40)}-${process.pid}-${randomBytes(3).toString('hex')}`;
const stopping = new AbortController();
const pool = computePool({ threads: settings.WORKER_THREADS, nice: settings.WORKER_NICE });

const consumers: Consumer[] = [
  consume(jobDefinitions['run-readout'], runReadout(workerId, pool, settings), {
    concurrency: settings.WORKER_READOUTS,
    stopping: stopping.signal,
  }),
  consume(partQueue, runReadoutPart(pool, settings), { concurrency: 1, stopping: stopping.signal }),
  consume(finishQueue, finishSpreadReadout(workerId, pool, settings), {
    concurrency: 1,
    stopping: stopping.signal,
  }),
  consume(jobDefinitions['read-file'], readFile, {
    concurrency: settings.WORKER_READERS,
    stopping: stopping.signal,
  }),
  consume(jobDefinitions['run-intake'], runIntake, {
    concurrency: settings.WORKER_READERS,
    stopping: stopping.signal,
  }),
];
const loops = [
  repeat('relay the outbox', settings.WORKER_RELAY_MS, async () => void (await relayOutbox())),
  repeat('look for lost work', settings.WORKER_RECONCILE_MS, () =>
    reconcileWork({ staleMs: settings.WORKER_STALE_MS, waitingMs: settings.WORKER_WAITING_MS }),
  ),
  repeat('forget what was sent long ago', 600_000, forgetSent),
  repeat('forget old idempotency keys', 3_600_000, forgetOldKeys),
  repeat('send mails', 2_000, () => sendWaitingMails()),
  repeat('say that the worker is alive', 4_000, () => announceWorker(workerId)),
];
log.info(
  { workerId, readouts: settings.WORKER_READOUTS, threads: settings.WORKER_THREADS },
  'the worker is up',
);

let isStopping = false;
/** Takes nothing new, lets running work end for a while, gives the rest back to the queue, and ends. */
async function stop(signal: string): Promise<void> {
  if (isStopping) return;
  isStopping = true;
  log.info({ signal }, 'the worker stops');
  // Whatever hangs below, the process ends.
  setTimeout(() => process.exit(1), settings.WORKER_DRAIN_MS + 5_000).unref();
  for (const loop of loops) loop.stop();
  const draining = Promise.all(consumers.map((consumer) => consumer.close(settings.WORKER_DRAIN_MS + 3_000)));
  await within(draining, settings.WORKER_DRAIN_MS, 'Running work').catch(() => undefined);
  stopping.abort(new Error('the worker stops'));
  pool.close();
  await draining;
  await relayOutbox().catch(() => undefined); // what was given back may find another worker
  await withdrawWorker(workerId);
  await closeQueues(1_000);
  closeRedis();
  await within(closeDb(), 1_000, 'The database').catch(() => undefined);
  process.exit(0);
}
for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => void stop(signal));
process.on('unhandledRejection', (error) => log.error({ err: error }, 'an unhandled rejection'));
process.on('uncaughtException', (error) => {
  log.fatal({ err: error }, 'the worker fell over');
  process.exit(1);
});
