import type { LiveEvent } from '@/lib/contracts/readout';
import { redis } from '@/lib/jobs/connection';
import { liveChannel } from '@/lib/jobs/live-channel';

/**
 * Tells open pages about a new state. Never throws and never waits for Redis: MariaDB holds the truth, and pages
 * read it again by themselves when nothing comes.
 */
export async function publishLive({ labId, ...event }: LiveEvent & { labId: string }): Promise<void> {
  try {
    await redis().publish(liveChannel(labId, event.sessionId), JSON.stringify(event));
  } catch {
    // Redis is away; its connection has logged that.
  }
}
