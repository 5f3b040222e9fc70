import { Redis, type RedisOptions } from 'ioredis';
import { env } from '@/lib/env/env';
import { log } from '@/lib/log/log';

const shared = globalThis as typeof globalThis & { outfoldRedis?: { url: string; redis: Redis } };

/**
 * The producer's connection, shared by queues, rate limits and live events of this process. It fails fast: with Redis
 * away a command rejects within about two seconds instead of waiting for it to come back. It reconnects by itself.
 */
export function redis(): Redis {
  const url = env().REDIS_URL;
  if (shared.outfoldRedis?.url !== url) {
    shared.outfoldRedis?.redis.disconnect();
    shared.outfoldRedis = {
      url,
      redis: open(url, { maxRetriesPerRequest: 1, connectTimeout: 2_000, commandTimeout: 3_000 }),
    };
  }
  return shared.outfoldRedis.redis;
}

/**
 * A new connection for a worker or a subscriber: commands wait until Redis is back. Whoever asks for it closes it
 * (`quit()`, or `disconnect()` when Redis may be away).
 */
export function workerConnection(): Redis {
  return open(env().REDIS_URL, { maxRetriesPerRequest: null });
}

/** Closes the producer's connection; the next redis() opens a new one. */
export function closeRedis(): void {
  shared.outfoldRedis?.redis.disconnect();
  shared.outfoldRedis = undefined;
}

function open(url: string, options: RedisOptions): Redis {
  const connection = new Redis(url, {
    ...options,
    enableReadyCheck: true,
    retryStrategy: (times) => Math.min(times * 100, 1_000),
  });
  let lastLogged = 0;
  connection.on('error', (error: Error) => {
    // One line in ten seconds: while Redis is away every reconnection fails.
    if (Date.now() - lastLogged < 10_000) return;
    lastLogged = Date.now();
    log.warn({ reason: error.message }, 'Redis cannot be reached');
  });
  return connection;
}
