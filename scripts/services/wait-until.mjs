import { setTimeout as pause } from 'node:timers/promises';

/**
 * Repeats `check` until it resolves to something truthy. `assertAlive` may throw to end the wait early (the process
 * waited for has died).
 *
 * @throws Error naming `what` after `limitMs`, with the last failure as its cause
 */
export async function waitUntil(
  what,
  check,
  { limitMs = 30_000, everyMs = 50, assertAlive = () => {} } = {},
) {
  const end = Date.now() + limitMs;
  let cause;
  while (Date.now() < end) {
    assertAlive();
    try {
      const result = await check();
      if (result) return result;
    } catch (error) {
      cause = error;
    }
    await pause(everyMs);
  }
  throw new Error(`${what} did not become ready within ${Math.round(limitMs / 1000)} s`, { cause });
}
