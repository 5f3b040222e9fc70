import { setTimeout as sleep } from 'node:timers/promises';

/** Asks again and again until the answer is truthy; fails with `what` when that takes too long. */
export async function until<T>(
  what: string,
  ask: () => Promise<T>,
  limitMs = 45_000,
): Promise<NonNullable<T>> {
  const giveUpAt = Date.now() + limitMs;
  for (;;) {
    const answer = await ask().catch((error: unknown) => {
      if (Date.now() > giveUpAt) throw error;
      return null;
    });
    if (answer) return answer;
    if (Date.now() > giveUpAt) throw new Error(`${what} did not come within ${limitMs} ms`);
    await sleep(50);
  }
}
