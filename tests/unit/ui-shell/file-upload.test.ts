// @vitest-environment jsdom
import { describe, expect, it } from 'vitest';
import { ApiError } from '@/lib/client/api-error';
import { FileUpload } from '@/lib/client/upload/file-upload';
import { browserPartMemory } from '@/lib/client/upload/part-memory';
import { partRanges } from '@/lib/client/upload/part-ranges';
import { Slots } from '@/lib/client/upload/slots';
import { SpeedMeter } from '@/lib/client/upload/speed-meter';
import type { UploadTransport } from '@/lib/client/upload/upload-transport';

const partSizeBytes = 4;

// jsdom's Blob cannot be read as a buffer, and Node's global File is not there under jsdom: this one has the parts of File that are used.
function fileOf(text: string, name = 'counts.npy'): File {
  const blobOf = (value: string) => ({
    size: value.length,
    arrayBuffer: async () => new TextEncoder().encode(value).buffer,
  });
  return {
    name,
    ...blobOf(text),
    slice: (from: number, to: number) => ({
      ...blobOf(text.slice(from, to)),
      text: async () => text.slice(from, to),
    }),
  } as unknown as File;
}

function away(): ApiError {
  return new ApiError({ status: 503, code: 'unavailable', title: 'Away', detail: 'The store is away.' });
}

/** A service in memory that keeps what it is sent. */
function service(options: { failPut?: (part: number, call: number) => ApiError | null } = {}) {
  const stored = new Map<number, string>();
  const seen = { creates: 0, puts: [] as number[], completes: 0, atOnce: 0, mostAtOnce: 0 };
  const transport: UploadTransport = {
    async create() {
      seen.creates += 1;
      return { id: 'file-1', partSizeBytes };
    },
    async arrivedParts() {
      return [...stored.keys()];
    },
    async putPart(_fileId, part, onSent, signal) {
      seen.puts.push(part.number);
      seen.atOnce += 1;
      seen.mostAtOnce = Math.max(seen.mostAtOnce, seen.atOnce);
      await new Promise((resolve) => setTimeout(resolve, 2));
      seen.atOnce -= 1;
      signal.throwIfAborted();
      const failure = options.failPut?.(part.number, seen.puts.length);
      if (failure) throw failure;
      onSent(part.octets.size);
      stored.set(part.number, await part.octets.text());
    },
    async complete() {
      seen.completes += 1;
    },
  };
  return {
    transport,
    stored,
    seen,
    whole: () =>
      [...stored]
        .sort(([a], [b]) => a - b)
        .map(([, text]) => text)
        .join(''),
  };
}

function uploadOf(
  file: File,
  transport: UploadTransport,
  extra: Partial<ConstructorParameters<typeof FileUpload>[0]> = {},
) {
  return new FileUpload({
    file,
    transport,
    memory: browserPartMemory(localStorage),
    slots: new Slots(3),
    wait: async () => {},
    ...extra,
  });
}

describe('sending a file in parts', () => {
  it('cuts a file into parts that cover it once', () => {
    expect(partRanges(10, 4)).toEqual([
      { number: 1, from: 0, to: 4 },
      { number: 2, from: 4, to: 8 },
      { number: 3, from: 8, to: 10 },
    ]);
    expect(partRanges(8, 4)).toHaveLength(2);
    expect(partRanges(0, 4)).toEqual([]);
  });

  it('sends every octet once, at most three parts at a time, and completes', async () => {
    const { transport, seen, whole } = service();
    const text = 'abcdefghijklmnopqrstuvwxyz';
    const upload = uploadOf(fileOf(text), transport);
    await upload.start();
    expect(upload.snapshot).toMatchObject({ phase: 'sent', sentBytes: 26, partsDone: 7, partsAll: 7 });
    expect(whole()).toBe(text);
    expect(seen).toMatchObject({ creates: 1, completes: 1 });
    expect(seen.puts).toHaveLength(7);
    expect(seen.mostAtOnce).toBe(3);
  });

  it('tries again by itself when the service is away for a moment', async () => {
    const { transport, whole } = service({ failPut: (_part, call) => (call <= 2 ? away() : null) });
    const upload = uploadOf(fileOf('abcdefgh'), transport);
    await upload.start();
    expect(upload.snapshot.phase).toBe('sent');
    expect(whole()).toBe('abcdefgh');
  });

  it('is held when the service stays away, says so, and goes on from what is safe', async () => {
    let isAway = true;
    const { transport, seen, whole } = service({ failPut: (part) => (isAway && part > 1 ? away() : null) });
    const upload = uploadOf(fileOf('abcdefghijkl'), transport);
    await upload.start();
    expect(upload.snapshot).toMatchObject({ phase: 'held', safeBytes: 4, message: 'The store is away.' });
    expect(upload.snapshot.heldSince).not.toBeNull();
    isAway = false;
    const before = seen.puts.filter((part) => part === 1).length;
    await upload.start();
    expect(upload.snapshot.phase).toBe('sent');
    expect(seen.puts.filter((part) => part === 1)).toHaveLength(before);
    expect(whole()).toBe('abcdefghijkl');
  });

  it('ends with the sentence of a refusal and does not try again', async () => {
    const refusal = new ApiError({
      status: 413,
      code: 'too-large',
      title: 'Too large',
      detail: 'At most 50 GB.',
    });
    const { transport, seen } = service({ failPut: () => refusal });
    const upload = uploadOf(fileOf('abcd'), transport);
    await upload.start();
    expect(upload.snapshot).toMatchObject({ phase: 'refused', message: 'At most 50 GB.' });
    expect(seen.puts).toEqual([1]);
    expect(seen.completes).toBe(0);
  });

  it('pauses and goes on', async () => {
    const { transport, whole } = service();
    const text = 'abcdefghijklmnopqrstuvwxyz';
    const upload = uploadOf(fileOf(text), transport, { slots: new Slots(1) });
    const stop = upload.subscribe(() => {
      if (upload.snapshot.partsDone === 2 && upload.snapshot.phase === 'sending') upload.pause();
    });
    await upload.start();
    expect(upload.snapshot.phase).toBe('paused');
    stop();
    await upload.start();
    expect(upload.snapshot.phase).toBe('sent');
    expect(whole()).toBe(text);
  });

  it('goes on after a reload and sends only what is missing', async () => {
    localStorage.clear();
    let isAway = true;
    const { transport, seen, whole } = service({ failPut: (part) => (isAway && part === 3 ? away() : null) });
    await uploadOf(fileOf('abcdefghijkl'), transport, { slots: new Slots(1) }).start();
    isAway = false;
    seen.puts.length = 0;
    const again = uploadOf(fileOf('abcdefghijkl'), transport, { begun: { id: 'file-1', partSizeBytes } });
    await again.start();
    expect(again.snapshot.phase).toBe('sent');
    expect(seen.creates).toBe(1);
    expect(seen.puts).toEqual([3]);
    expect(whole()).toBe('abcdefghijkl');
  });

  it('sends parts again whose octets changed since, although name and size are the same', async () => {
    localStorage.clear();
    let isAway = true;
    const { transport, seen, whole } = service({ failPut: (part) => (isAway && part === 3 ? away() : null) });
    await uploadOf(fileOf('abcdefghijkl'), transport, { slots: new Slots(1) }).start();
    isAway = false;
    seen.puts.length = 0;
    await uploadOf(fileOf('abXdefghijkl'), transport, { begun: { id: 'file-1', partSizeBytes } }).start();
    expect([...seen.puts].sort()).toEqual([1, 3]);
    expect(whole()).toBe('abXdefghijkl');
  });
});

describe('the honest time left', () => {
  it('says nothing before it has watched long enough, then divides what is left by the speed', () => {
    let nowMs = 0;
    const meter = new SpeedMeter(() => nowMs);
    meter.reset(0);
    nowMs = 500;
    meter.record(500);
    expect(meter.secondsLeft(1000)).toBeNull();
    nowMs = 2000;
    meter.record(2000);
    expect(meter.bytesPerSecond).toBeCloseTo(1000);
    expect(meter.secondsLeft(3000)).toBeCloseTo(3);
  });

  it('forgets what lies more than ten seconds back', () => {
    let nowMs = 0;
    const meter = new SpeedMeter(() => nowMs);
    meter.reset(0);
    for (nowMs = 1000; nowMs <= 40_000; nowMs += 1000)
      meter.record(nowMs <= 20_000 ? nowMs * 10 : 200_000 + (nowMs - 20_000));
    expect(meter.bytesPerSecond).toBeCloseTo(1000, -1);
  });
});
