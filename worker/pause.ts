import { setTimeout as sleep } from 'node:timers/promises';

/** Waits for `ms`, or until the signal aborts. */
export async function pause(ms: number, signal: AbortSignal): Promise<void> {
  await sleep(ms, undefined, { signal }).catch(() => undefined);
}
