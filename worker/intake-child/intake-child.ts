import { readSync, writeSync } from 'node:fs';
import { carryOutTask, type ReaderHost } from '@/lib/intake/carry-out-task';
import { syncDescriptor, type FromReader, type ToReader } from '@/lib/intake/reader-messages';

/*
 * A reader process: one task on members' files, then the end. It has no settings, no credentials and no way to the store
 * or the database; bytes come from its parent and results go to it, so a hostile file costs this process at most.
 */
type Asked = Extract<FromReader, { request: number }>;
// Omit on a union would merge its members; this keeps them apart.
type WithoutNumber<T> = T extends unknown ? Omit<T, 'request'> : never;

const waiting = new Map<number, (answer: Uint8Array) => void>();
let requests = 0;

const tell = (message: FromReader): Promise<void> =>
  new Promise((resolve, reject) => {
    process.send!(message, undefined, undefined, (error) => (error ? reject(error) : resolve()));
  });

function ask(message: WithoutNumber<Asked>): Promise<Uint8Array> {
  const request = requests++;
  return new Promise((resolve, reject) => {
    waiting.set(request, resolve);
    tell({ ...message, request } as Asked).catch(reject);
  });
}

/** The fourth descriptor is a pipe to the parent: a line asks for a range, its bytes come back. The process waits meanwhile. */
function readAtOnce(fileId: string, offset: number, length: number): Uint8Array {
  writeSync(syncDescriptor, `${fileId} ${offset} ${length}\n`);
  const bytes = new Uint8Array(length);
  for (let filled = 0; filled < length;) {
    const n = readSync(syncDescriptor, bytes, filled, length - filled, null);
    if (n === 0) process.exit(1); // the parent is gone
    filled += n;
  }
  return bytes;
}

const host: ReaderHost = {
  sourceOf: ({ fileId, sizeBytes }) => ({
    sizeBytes,
    read: (offset, length) => ask({ kind: 'read', fileId, offset, length }),
    readSync: (offset, length) => readAtOnce(fileId, offset, length),
  }),
  keep: async (dataHash, name, bytes) => {
    await ask({ kind: 'keep', dataHash, name, bytes });
  },
};

process.on('disconnect', () => process.exit(1));
// The parent may have been killed while this file was still being loaded: then the event has passed unheard.
if (!process.connected) process.exit(1);
process.on('message', (message: ToReader) => {
  if (message.kind !== 'task') {
    const resolve = waiting.get(message.request);
    waiting.delete(message.request);
    resolve?.(message.kind === 'bytes' ? message.bytes : new Uint8Array(0));
    return;
  }
  carryOutTask(message.task, host)
    .then(
      (answer) => tell({ kind: 'answer', answer }),
      (error: unknown) => tell({ kind: 'failed', message: (error as Error).stack ?? String(error) }),
    )
    .finally(() => process.exit(0));
});
