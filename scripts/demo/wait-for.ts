import { setTimeout as pause } from 'node:timers/promises';

/** Asks until `done` says so. @throws after `limitMs`, naming what was waited for */
export async function waitFor<T>(
  what: string,
  ask: () => Promise<T>,
  done: (value: T) => boolean,
  limitMs = 120_000,
): Promise<T> {
  const end = Date.now() + limitMs;
  for (;;) {
    const value = await ask();
    if (done(value)) return value;
    if (Date.now() > end) throw new Error(`${what} did not come within ${limitMs / 1000} s`);
    await pause(150);
  }
}
