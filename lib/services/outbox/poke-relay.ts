import { log } from '@/lib/log/log';
import { relayOutbox } from '@/lib/services/outbox/relay-outbox';

/**
 * Sends what a commit has just added, without making the request wait for it. Should it fail, the worker's relay finds
 * the same entries half a second later.
 */
export function pokeRelay(): void {
  relayOutbox().catch((error: unknown) => log.debug({ err: error }, 'the relay was poked in vain'));
}
