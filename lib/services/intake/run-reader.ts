import type { ChildProcess } from 'node:child_process';
import { readFile } from 'node:fs/promises';
import type { Duplex } from 'node:stream';
import {
  syncDescriptor,
  type FromReader,
  type ReaderAnswer,
  type ReaderTask,
  type ToReader,
} from '@/lib/intake/reader-messages';
import { ReaderLost } from '@/lib/services/intake/reader-lost';
import { keepReaderReady, takeReader } from '@/lib/services/intake/reader-process';

export interface ReaderOptions {
  /** Bytes of one of the task's files. */
  read(fileId: string, offset: number, length: number): Promise<Uint8Array>;
  /** Keeps one object of the canonical form; only an intake needs it. */
  keep?(dataHash: string, name: string, bytes: Uint8Array): Promise<void>;
  maxSeconds: number;
  maxBytes?: number;
  abort?: AbortSignal;
  /** Starts the next process ahead; for the worker, which has many tasks. */
  keepReady?: boolean;
}

const DEFAULT_MAX_BYTES = 512 * 1024 * 1024;
const LOOK_EVERY_MS = 200;
const PAGE_BYTES = 4096;

/**
 * Does a task in a process of its own that has no credentials, ends within `maxSeconds` and is killed above `maxBytes`
 * of memory.
 * @throws ReaderLost where the process ended without an answer; what `read` or `keep` threw; the abort's reason
 */
export function runReader<Kind extends ReaderAnswer['kind']>(
  task: ReaderTask,
  kind: Kind,
  options: ReaderOptions,
): Promise<Extract<ReaderAnswer, { kind: Kind }>> {
  const child = takeReader();
  child.channel?.ref();
  return new Promise((resolve, reject) => {
    let failure: Error | null = null;
    let answer: ReaderAnswer | null = null;
    let words = '';
    const kill = (why: Error): void => {
      failure ??= why;
      child.kill('SIGKILL');
    };
    const limit = setTimeout(
      () => kill(new ReaderLost('time', `reading took longer than ${options.maxSeconds} s`)),
      options.maxSeconds * 1000,
    );
    const looking = setInterval(() => {
      void memoryOf(child).then((bytes) => {
        if (bytes > (options.maxBytes ?? DEFAULT_MAX_BYTES))
          kill(new ReaderLost('memory', `reading needed ${Math.round(bytes / 1024 / 1024)} MiB`));
      });
    }, LOOK_EVERY_MS);
    const onAbort = (): void =>
      kill(options.abort?.reason instanceof Error ? options.abort.reason : new Error('stopped'));
    options.abort?.addEventListener('abort', onAbort, { once: true });
    if (options.abort?.aborted) onAbort();

    child.stderr?.on('data', (chunk: Buffer) => (words = (words + chunk.toString()).slice(-2000)));
    child.on('message', (message: FromReader) => {
      if (message.kind === 'answer') answer = message.answer;
      else if (message.kind === 'failed') failure ??= new ReaderLost('crash', message.message);
      else serve(child, message, options).catch((error: unknown) => kill(error as Error));
    });
    answerAtOnce(child.stdio[syncDescriptor] as Duplex, options).catch((error: unknown) =>
      kill(error as Error),
    );
    child.once('error', kill);
    // 'close' and not 'exit': the last message may still be on its way.
    child.once('close', (code, signal) => {
      clearTimeout(limit);
      clearInterval(looking);
      options.abort?.removeEventListener('abort', onAbort);
      if (options.keepReady && !options.abort?.aborted) keepReaderReady();
      if (failure !== null) reject(failure);
      else if (answer?.kind === kind) resolve(answer as Extract<ReaderAnswer, { kind: Kind }>);
      else if (/heap out of memory|allocation failed/i.test(words))
        reject(new ReaderLost('memory', 'reading ran out of memory'));
      else reject(new ReaderLost('crash', `the reader ended early (${signal ?? `code ${code}`}): ${words}`));
    });
    send(child, { kind: 'task', task });
  });
}

async function serve(
  child: ChildProcess,
  message: Extract<FromReader, { request: number }>,
  options: ReaderOptions,
): Promise<void> {
  const { request } = message;
  if (message.kind === 'read')
    send(child, {
      kind: 'bytes',
      request,
      bytes: await options.read(message.fileId, message.offset, message.length),
    });
  else {
    if (options.keep === undefined) throw new Error('this task keeps nothing');
    await options.keep(message.dataHash, message.name, message.bytes);
    send(child, { kind: 'kept', request });
  }
}

/** Answers the ranges that the reader asks for while it waits: a line each, answered by its bytes. */
async function answerAtOnce(pipe: Duplex, options: ReaderOptions): Promise<void> {
  pipe.on('error', () => undefined); // the reader ended; its 'close' tells the story
  let left = '';
  for await (const chunk of pipe as AsyncIterable<Buffer>) {
    left += chunk.toString('latin1');
    for (let end = left.indexOf('\n'); end !== -1; end = left.indexOf('\n')) {
      const [fileId, offset, length] = left.slice(0, end).split(' ');
      left = left.slice(end + 1);
      pipe.write(await options.read(fileId, Number(offset), Number(length)));
    }
  }
}

function send(child: ChildProcess, message: ToReader): void {
  // A child that has just ended takes no message; its 'close' tells the story.
  if (child.connected) child.send(message, () => undefined);
}

/** Resident memory by the kernel's account; 0 where it cannot be told. */
async function memoryOf(child: ChildProcess): Promise<number> {
  try {
    const pages = (await readFile(`/proc/${child.pid}/statm`, 'utf8')).split(' ')[1];
    return Number(pages) * PAGE_BYTES;
  } catch {
    return 0;
  }
}
