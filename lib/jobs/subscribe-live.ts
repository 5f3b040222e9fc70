import type { Redis } from 'ioredis';
import { liveEventSchema, type LiveEvent } from '@/lib/contracts/readout';
import { workerConnection } from '@/lib/jobs/connection';
import { liveChannel } from '@/lib/jobs/live-channel';

type Listener = (event: LiveEvent) => void;
interface Hub {
  connection: Redis;
  listeners: Map<string, Set<Listener>>;
}
const shared = globalThis as typeof globalThis & { outfoldLive?: Hub };

/** A running subscription. `isHealthy` is false while Redis is away, when the caller must look for itself. */
export interface LiveSubscription {
  isHealthy(): boolean;
  close(): void;
}

/** Listens to one session's live events. All subscriptions of a process share one connection. */
export function subscribeLive(labId: string, sessionId: string, onEvent: Listener): LiveSubscription {
  const { connection, listeners } = (shared.outfoldLive ??= openHub());
  const channel = liveChannel(labId, sessionId);
  let ofChannel = listeners.get(channel);
  if (!ofChannel) {
    ofChannel = new Set();
    listeners.set(channel, ofChannel);
    // ioredis repeats its subscriptions after each reconnection.
    connection.subscribe(channel).catch(() => undefined);
  }
  ofChannel.add(onEvent);
  return {
    isHealthy: () => connection.status === 'ready',
    close: () => {
      ofChannel.delete(onEvent);
      if (ofChannel.size > 0 || listeners.get(channel) !== ofChannel) return;
      listeners.delete(channel);
      connection.unsubscribe(channel).catch(() => undefined);
    },
  };
}

/** Ends the shared subscriber connection. */
export function closeLive(): void {
  shared.outfoldLive?.connection.disconnect();
  delete shared.outfoldLive;
}

function openHub(): Hub {
  const connection = workerConnection();
  const listeners: Hub['listeners'] = new Map();
  connection.on('message', (channel: string, text: string) => {
    const event = liveEventSchema.safeParse(parseJson(text));
    if (event.success) for (const listener of listeners.get(channel) ?? []) listener(event.data);
  });
  return { connection, listeners };
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}
