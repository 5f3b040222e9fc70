'use client';

import { useEffect, useEffectEvent, useState } from 'react';
import { liveEventSchema, type LiveEvent } from '@/lib/contracts/readout';

/** How long a silent or broken stream is waited for before the page asks by itself. */
const pollEveryMs = 4000;

/**
 * Follows a session's live events (states and progress of its files, intake and readouts).
 * `onEvent` gets each event; `onPoll` runs every few seconds while the stream is away, so that a page is never stuck.
 * Returns how the page is being kept up to date.
 */
export function useLiveEvents(
  sessionId: string,
  handlers: { onEvent: (event: LiveEvent) => void; onPoll: () => void },
): 'stream' | 'polling' {
  const [isStreaming, setIsStreaming] = useState(false);
  const onEvent = useEffectEvent(handlers.onEvent);
  const onPoll = useEffectEvent(handlers.onPoll);

  useEffect(() => {
    if (typeof EventSource === 'undefined') return;
    const read = (message: MessageEvent<string>) => {
      let body: unknown;
      try {
        body = JSON.parse(message.data);
      } catch {
        return;
      }
      const parsed = liveEventSchema.safeParse(body);
      if (parsed.success) onEvent(parsed.data);
    };
    let source: EventSource | null = null;
    let retry: ReturnType<typeof setTimeout> | undefined;
    const connect = () => {
      source = new EventSource(`/api/v1/events?session=${encodeURIComponent(sessionId)}`);
      source.onopen = () => setIsStreaming(true);
      source.onerror = () => {
        setIsStreaming(false);
        // the browser gives up for good on an HTTP error; ask again ourselves
        if (source?.readyState === EventSource.CLOSED) retry = setTimeout(connect, 3 * pollEveryMs);
      };
      source.onmessage = read;
      for (const kind of ['readout', 'session', 'file']) source.addEventListener(kind, read);
    };
    connect();
    return () => {
      clearTimeout(retry);
      source?.close();
    };
  }, [sessionId]);

  useEffect(() => {
    if (isStreaming) return;
    const timer = setInterval(() => onPoll(), pollEveryMs);
    return () => clearInterval(timer);
  }, [isStreaming, sessionId]);

  return isStreaming ? 'stream' : 'polling';
}
