import { ApiError } from '@/lib/client/api-error';
import { hashOctets } from '@/lib/client/upload/hash-octets';
import type { PartMemory } from '@/lib/client/upload/part-memory';
import { partRanges, type PartRange } from '@/lib/client/upload/part-ranges';
import type { Slots } from '@/lib/client/upload/slots';
import { SpeedMeter } from '@/lib/client/upload/speed-meter';
import type { UploadTransport } from '@/lib/client/upload/upload-transport';

/** Where an upload stands. `held`: the line or the service is away; `refused`: the service will not take it. */
export type UploadPhase =
  'waiting' | 'checking' | 'sending' | 'paused' | 'held' | 'completing' | 'sent' | 'refused';

export interface UploadSnapshot {
  phase: UploadPhase;
  fileId: string | null;
  sizeBytes: number;
  /** Octets that the service has or that are on their way. */
  sentBytes: number;
  /** Octets of whole parts that the service has. */
  safeBytes: number;
  partsDone: number;
  partsAll: number;
  bytesPerSecond: number | null;
  secondsLeft: number | null;
  /** Why it is held or refused. */
  message: string | null;
  heldSince: number | null;
}

export interface FileUploadOptions {
  file: File;
  transport: UploadTransport;
  memory: PartMemory;
  slots: Slots;
  /** An upload of the same name and size that was begun earlier and not finished. */
  begun?: { id: string; partSizeBytes: number };
  now?: () => number;
  wait?: (ms: number) => Promise<void>;
}

const retryAfterMs = [500, 2_000, 5_000];

/**
 * Sends one file in parts, several at once, and can pause, go on and survive what passes. After a reload it goes on from the parts
 * that have arrived, but only where their hashes say that they are of the very same file; other parts are sent again.
 */
export class FileUpload {
  readonly file: File;
  readonly #options: FileUploadOptions;
  readonly #now: () => number;
  readonly #wait: (ms: number) => Promise<void>;
  readonly #listeners = new Set<() => void>();
  readonly #meter: SpeedMeter;
  readonly #onTheirWay = new Map<number, number>();
  readonly #done = new Set<number>();
  #parts: PartRange[] = [];
  #abort = new AbortController();
  #snapshot: UploadSnapshot;

  constructor(options: FileUploadOptions) {
    this.#options = options;
    this.file = options.file;
    this.#now = options.now ?? (() => Date.now());
    this.#wait = options.wait ?? ((ms) => new Promise((resolve) => setTimeout(resolve, ms)));
    this.#meter = new SpeedMeter(this.#now);
    this.#snapshot = {
      phase: 'waiting',
      fileId: options.begun?.id ?? null,
      sizeBytes: options.file.size,
      sentBytes: 0,
      safeBytes: 0,
      partsDone: 0,
      partsAll: 0,
      bytesPerSecond: null,
      secondsLeft: null,
      message: null,
      heldSince: null,
    };
  }

  get snapshot(): UploadSnapshot {
    return this.#snapshot;
  }

  subscribe(listener: () => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  /** Begins, or goes on after a pause or a hold. Resolves when it is sent, paused, held or refused; never rejects. */
  async start(): Promise<void> {
    const { phase } = this.#snapshot;
    if (phase !== 'waiting' && phase !== 'paused' && phase !== 'held' && phase !== 'refused') return;
    this.#abort = new AbortController();
    const { signal } = this.#abort;
    try {
      this.#say({ phase: 'checking', message: null, heldSince: null });
      const fileId = await this.#open(signal);
      signal.throwIfAborted();
      this.#meter.reset(this.#safeBytes());
      this.#say({ phase: 'sending' });
      const left = this.#parts.filter((part) => !this.#done.has(part.number));
      await this.#sendAll(fileId, left, signal);
      this.#say({ phase: 'completing' });
      await this.#retrying(() => this.#options.transport.complete(fileId), signal);
      this.#options.memory.forget(fileId);
      this.#say({ phase: 'sent' });
    } catch (error) {
      this.#onTheirWay.clear();
      this.#stopped(error);
    }
  }

  /** Stops sending; what has arrived stays. */
  pause(): void {
    if (this.#snapshot.phase !== 'sending' && this.#snapshot.phase !== 'checking') return;
    this.#abort.abort(new PauseSignal());
  }

  /** Gives up for good; the caller removes what the service has. */
  cancel(): void {
    this.#abort.abort(new PauseSignal());
    if (this.#snapshot.fileId) this.#options.memory.forget(this.#snapshot.fileId);
  }

  /** Sends parts side by side; the first failure stops the others, and all have ended when it returns. */
  async #sendAll(fileId: string, parts: readonly PartRange[], signal: AbortSignal): Promise<void> {
    const controller = this.#abort;
    await Promise.allSettled(
      parts.map((part) =>
        this.#send(fileId, part, signal).catch((error: unknown) => {
          controller.abort(error);
        }),
      ),
    );
    signal.throwIfAborted();
  }

  async #open(signal: AbortSignal): Promise<string> {
    const { transport, begun } = this.#options;
    const known = this.#snapshot.fileId;
    if (known !== null && this.#parts.length > 0) return known;
    const opened =
      begun ??
      (await this.#retrying(
        () => transport.create({ name: this.file.name, sizeBytes: this.file.size }),
        signal,
      ));
    this.#parts = partRanges(this.file.size, Math.max(1, opened.partSizeBytes));
    this.#say({ fileId: opened.id, partsAll: this.#parts.length });
    if (begun) await this.#findSame(opened.id, signal);
    return opened.id;
  }

  /** Marks as done the parts that the service has and whose hash this browser remembers for these octets. */
  async #findSame(fileId: string, signal: AbortSignal): Promise<void> {
    const arrived = new Set(await this.#retrying(() => this.#options.transport.arrivedParts(fileId), signal));
    const remembered = this.#options.memory.read(fileId);
    this.#done.clear();
    for (const part of this.#parts) {
      signal.throwIfAborted();
      const expected = remembered[part.number];
      if (!arrived.has(part.number) || expected === undefined) continue;
      if ((await hashOctets(this.#octets(part))) === expected) this.#done.add(part.number);
      this.#say({});
    }
  }

  async #send(fileId: string, part: PartRange, signal: AbortSignal): Promise<void> {
    await this.#options.slots.run(async () => {
      signal.throwIfAborted();
      const octets = this.#octets(part);
      const sha256 = await hashOctets(octets);
      await this.#retrying(async () => {
        await this.#options.transport.putPart(
          fileId,
          { number: part.number, octets, sha256 },
          (bytes) => {
            this.#onTheirWay.set(part.number, bytes);
            this.#progressed();
          },
          signal,
        );
      }, signal);
      if (sha256 !== null) this.#options.memory.remember(fileId, part.number, sha256);
      this.#onTheirWay.delete(part.number);
      this.#done.add(part.number);
      this.#progressed();
    });
  }

  #octets(part: PartRange): Blob {
    return this.file.slice(part.from, part.to);
  }

  async #retrying<T>(work: () => Promise<T>, signal: AbortSignal): Promise<T> {
    for (let attempt = 0; ; attempt += 1) {
      signal.throwIfAborted();
      try {
        return await work();
      } catch (error) {
        signal.throwIfAborted();
        const isPassing = error instanceof ApiError && (error.isPassing || arrivedDamaged(error));
        if (!isPassing || attempt >= retryAfterMs.length) throw error;
        await this.#wait(retryAfterMs[attempt]);
      }
    }
  }

  #stopped(error: unknown): void {
    if (error instanceof PauseSignal) {
      this.#say({ phase: 'paused', bytesPerSecond: null, secondsLeft: null });
      return;
    }
    const isPassing = error instanceof ApiError && error.isPassing;
    const message =
      error instanceof ApiError
        ? error.message
        : 'The file can no longer be read on this computer: it was moved or changed. Remove it here and add it again.';
    this.#say({
      phase: isPassing ? 'held' : 'refused',
      message,
      heldSince: isPassing ? this.#now() : null,
      bytesPerSecond: null,
      secondsLeft: null,
    });
  }

  #safeBytes(): number {
    return this.#parts.reduce(
      (sum, part) => (this.#done.has(part.number) ? sum + part.to - part.from : sum),
      0,
    );
  }

  #progressed(): void {
    this.#say({});
    this.#meter.record(this.#snapshot.sentBytes);
    this.#say({
      bytesPerSecond: this.#meter.bytesPerSecond,
      secondsLeft: this.#meter.secondsLeft(this.file.size - this.#snapshot.sentBytes),
    });
  }

  #say(change: Partial<UploadSnapshot>): void {
    const safeBytes = this.#safeBytes();
    const underway = [...this.#onTheirWay.values()].reduce((sum, bytes) => sum + bytes, 0);
    this.#snapshot = {
      ...this.#snapshot,
      safeBytes,
      sentBytes: Math.min(this.file.size, safeBytes + underway),
      partsDone: this.#done.size,
      ...change,
    };
    for (const listener of this.#listeners) listener();
  }
}

/** Tells a pause from a failure. */
class PauseSignal extends Error {}

/** A part whose octets changed on the way is worth sending again. */
function arrivedDamaged(error: ApiError): boolean {
  return error.faults.some((fault) => fault.code === 'part-digest');
}
