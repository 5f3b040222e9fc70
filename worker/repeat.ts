import { AppError } from '@/lib/errors/app-error';
import { log } from '@/lib/log/log';

/** Does something again and again, `everyMs` after the last time ended. Failures are logged and never end it. */
export function repeat(what: string, everyMs: number, work: () => Promise<void>): { stop(): void } {
  let timer: NodeJS.Timeout | undefined;
  let isStopped = false;
  const turn = async () => {
    try {
      await work();
    } catch (error) {
      const isAway = error instanceof AppError && error.code === 'unavailable';
      if (isAway) log.debug({ err: error }, `could not ${what}`);
      else log.error({ err: error }, `could not ${what}`);
    }
    if (!isStopped) timer = setTimeout(() => void turn(), everyMs);
  };
  void turn();
  return {
    stop() {
      isStopped = true;
      clearTimeout(timer);
    },
  };
}
