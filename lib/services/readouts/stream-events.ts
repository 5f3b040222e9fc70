import { db } from '@/db/connection';
import { listLiveStates } from '@/db/repositories/live-states';
import { findSession } from '@/db/repositories/recording-sessions';
import type { LiveEvent } from '@/lib/contracts/readout';
import { subscribeLive } from '@/lib/jobs/subscribe-live';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';

/** How often the database is looked at while Redis is away, and while it is there: events of pub/sub can be lost. */
const pollAwayMs = 2_000;
const pollMs = 10_000;
/** A comment line this often keeps proxies from closing a quiet stream. */
const heartbeatMs = 15_000;
/** The browser comes back by itself; until then its rights may have changed, so that no stream lasts for ever. */
const lastsMs = 5 * 60_000;

/**
 * A session's live events as text/event-stream: the present states first, then every change. It ends when the request
 * is aborted. Each event's data is a LiveEvent as JSON.
 * @throws AppError not-found for another lab's session
 */
export async function streamEvents(
  ctx: Ctx,
  input: { sessionId: string; signal: AbortSignal },
): Promise<Response> {
  authorize(ctx, 'events.read');
  const { labId } = ctx.actor;
  const { sessionId, signal } = input;
  if ((await findSession(db(), labId, sessionId)) === null) throw notFound();

  let stop: () => void = () => undefined;
  const body = new ReadableStream<Uint8Array>({
    start(controller) {
      stop = feed(controller, labId, sessionId);
      signal.addEventListener('abort', stop, { once: true });
      if (signal.aborted) stop();
    },
    cancel: () => stop(),
  });
  return new Response(body, {
    headers: {
      'content-type': 'text/event-stream; charset=utf-8',
      'cache-control': 'no-store, no-transform',
      'x-accel-buffering': 'no',
    },
  });
}

/** Feeds one stream until it is stopped; returns how to stop it. */
function feed(
  controller: ReadableStreamDefaultController<Uint8Array>,
  labId: string,
  sessionId: string,
): () => void {
  const encoder = new TextEncoder();
  const lastSent = new Map<string, string>();
  let isOver = false;
  let isLooking = false;
  let lastLookAt = 0;

  const write = (text: string) => {
    if (!isOver) controller.enqueue(encoder.encode(text));
  };
  const send = (event: LiveEvent) => {
    const data = JSON.stringify(event);
    const subject =
      event.kind === 'readout' ? event.readoutId : event.kind === 'file' ? event.fileId : 'session';
    // Looking again and again tells only what is new.
    if (lastSent.get(subject) === data) return;
    lastSent.set(subject, data);
    write(`event: ${event.kind}\ndata: ${data}\n\n`);
  };
  const look = async () => {
    if (isLooking || isOver) return;
    isLooking = true;
    lastLookAt = Date.now();
    try {
      for (const event of await listLiveStates(db(), labId, sessionId)) send(event);
    } catch {
      write(': the database is away\n\n');
    } finally {
      isLooking = false;
    }
  };

  write('retry: 2000\n\n');
  const subscription = subscribeLive(labId, sessionId, send);
  void look();
  const looking = setInterval(() => {
    const isDue = Date.now() - lastLookAt >= (subscription.isHealthy() ? pollMs : pollAwayMs);
    if (isDue) void look();
  }, 1_000);
  const beating = setInterval(() => write(': still here\n\n'), heartbeatMs);
  const stop = () => {
    if (isOver) return;
    isOver = true;
    clearInterval(looking);
    clearInterval(beating);
    clearTimeout(ending);
    subscription.close();
    try {
      controller.close();
    } catch {
      // the reader has gone already
    }
  };
  const ending = setTimeout(stop, lastsMs);
  return stop;
}
