import {
  RateLimiterMemory,
  RateLimiterRedis,
  RateLimiterRes,
  type RateLimiterAbstract,
} from 'rate-limiter-flexible';
import { AppError } from '@/lib/errors/app-error';
import { redis } from '@/lib/jobs/connection';

export interface RateBudget {
  /** A short name; with the key it makes one counter. */
  name: string;
  points: number;
  seconds: number;
}

const limitersOf = new WeakMap<object, Map<string, RateLimiterAbstract>>();

/** The counter of a budget: in Redis, shared by all web servers; in this process's memory while Redis is away. */
export function limiterOf(budget: RateBudget): RateLimiterAbstract {
  const storeClient = redis();
  let limiters = limitersOf.get(storeClient);
  if (limiters === undefined) limitersOf.set(storeClient, (limiters = new Map()));
  const id = `${budget.name}/${budget.points}/${budget.seconds}`;
  let limiter = limiters.get(id);
  if (limiter === undefined) {
    const memory = new RateLimiterMemory({
      keyPrefix: budget.name,
      points: budget.points,
      duration: budget.seconds,
    });
    limiter = new RateLimiterRedis({
      storeClient,
      keyPrefix: `rate_${budget.name}`,
      points: budget.points,
      duration: budget.seconds,
      rejectIfRedisNotReady: true,
      insuranceLimiter: memory,
    });
    limiters.set(id, limiter);
  }
  return limiter;
}

/** Takes one point of the key's budget and gives the headers that tell what is left; none left: `rate-limited`. */
export async function limitRate(budget: RateBudget, key: string): Promise<Record<string, string>> {
  try {
    return headersOf(budget, await limiterOf(budget).consume(key));
  } catch (error) {
    if (!(error instanceof RateLimiterRes)) throw error;
    const seconds = Math.max(1, Math.ceil(error.msBeforeNext / 1000));
    throw new AppError('rate-limited', `Too many requests. Try again in ${seconds} s.`, {
      retryAfterSeconds: seconds,
    });
  }
}

function headersOf(budget: RateBudget, state: RateLimiterRes): Record<string, string> {
  return {
    'ratelimit-limit': String(budget.points),
    'ratelimit-remaining': String(Math.max(0, state.remainingPoints)),
    'ratelimit-reset': String(Math.max(0, Math.ceil(state.msBeforeNext / 1000))),
  };
}
