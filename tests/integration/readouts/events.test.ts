import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import { liveEventSchema, type LiveEvent } from '@/lib/contracts/readout';
import { closeRedis } from '@/lib/jobs/connection';
import { publishLive } from '@/lib/jobs/publish-live';
import { closeQueues } from '@/lib/jobs/queues';
import { closeLive } from '@/lib/jobs/subscribe-live';
import { cancelReadout } from '@/lib/services/readouts/cancel-readout';
import { createReadout } from '@/lib/services/readouts/create-readout';
import { streamEvents } from '@/lib/services/readouts/stream-events';
import { ctxOf } from '@/tests/integration/readouts/ctx-of';
import { makeData, makeSession, type MadeSession } from '@/tests/integration/readouts/made-session';
import { until } from '@/tests/integration/readouts/until';
import { control } from '@/tests/support/control';
import { insertLab } from '@/tests/support/rows';
import { freshDatabase } from '@/tests/support/services';

/** Seconds on a machine that has nothing else to do; the limit is for one that has. */
vi.setConfig({ testTimeout: 240_000, hookTimeout: 240_000 });

let dropDatabase: () => Promise<void>;
let made: MadeSession;
const ctx = () => ctxOf(made.lab);

beforeAll(async () => {
  dropDatabase = await freshDatabase();
  made = await makeSession(makeData({ nTrials: 40, nUnits: 4, nBins: 2 }));
});
afterAll(async () => {
  closeLive();
  await closeQueues();
  closeRedis();
  await dropDatabase?.();
});

/** Opens a stream and gathers its events until it is closed. */
async function open(): Promise<{ events: LiveEvent[]; isOver: () => boolean; close: () => void }> {
  const abort = new AbortController();
  const response = await streamEvents(ctx(), { sessionId: made.sessionId, signal: abort.signal });
  expect(response.headers.get('content-type')).toContain('text/event-stream');
  const events: LiveEvent[] = [];
  let isOver = false;
  void (async () => {
    let text = '';
    for await (const bytes of response.body as unknown as AsyncIterable<Uint8Array>) {
      text += new TextDecoder().decode(bytes);
      const blocks = text.split('\n\n');
      text = blocks.pop()!;
      for (const block of blocks) {
        const data = block.split('\n').find((line) => line.startsWith('data: '));
        if (data) events.push(liveEventSchema.parse(JSON.parse(data.slice(6))));
      }
    }
    isOver = true;
  })();
  return { events, isOver: () => isOver, close: () => abort.abort() };
}
const states = (events: LiveEvent[]) =>
  events.flatMap((event) => (event.kind === 'readout' ? [event.state] : []));

it('tells the present states first, then every change, and ends with the request', async () => {
  const { id } = await createReadout(ctx(), { sessionId: made.sessionId, recipe: { label: 'fraction' } });
  const stream = await open();
  await until('the present states', async () => stream.events.length >= 2);
  expect(stream.events).toEqual([
    { kind: 'session', sessionId: made.sessionId, state: 'ready' },
    { kind: 'readout', sessionId: made.sessionId, readoutId: id, state: 'queued', progress: null },
  ]);
  const progress = { done: 5, total: 10, phase: 'Shuffled control', secondsLeft: 3 };
  await until('the subscription', async () => {
    await publishLive({
      labId: made.lab.labId,
      kind: 'readout',
      sessionId: made.sessionId,
      readoutId: id,
      state: 'running',
      progress,
    });
    return stream.events.length > 2;
  });
  expect(stream.events.at(-1)).toMatchObject({ state: 'running', progress });
  await cancelReadout(ctx(), { readoutId: id });
  await until('the cancelled state', async () => states(stream.events).includes('cancelled'), 3_000);
  stream.close();
  await until('the end of the stream', async () => stream.isOver(), 3_000);
});

it('never carries another lab’s events, and is refused for another lab’s session', async () => {
  const stream = await open();
  await until('the present states', async () => stream.events.length >= 1);
  const stranger = await insertLab();
  const { sessionId } = made;
  await publishLive({ labId: stranger.labId, kind: 'session', sessionId, state: 'refused' });
  await sleep(300);
  expect(stream.events.some((event) => event.state === 'refused')).toBe(false);
  stream.close();
  await expect(
    streamEvents(ctxOf(stranger), { sessionId, signal: new AbortController().signal }),
  ).rejects.toMatchObject({ code: 'not-found' });
});

it('looks for itself while Redis is away, and takes the events up again afterwards', async () => {
  const stream = await open();
  await until('the present states', async () => stream.events.length >= 1);
  await control('redis', 'kill');
  const { id } = await createReadout(ctx(), { sessionId: made.sessionId, recipe: { label: 'fraction' } });
  const isTold = async () =>
    stream.events.some((event) => event.kind === 'readout' && event.readoutId === id);
  await until('the new readout', isTold, 8_000);
  await control('redis', 'start');
  await until('events again', async () => {
    const event = { kind: 'session' as const, sessionId: made.sessionId, state: 'checking' };
    await publishLive({ labId: made.lab.labId, ...event });
    return stream.events.some(({ state }) => state === 'checking');
  });
  stream.close();
});
