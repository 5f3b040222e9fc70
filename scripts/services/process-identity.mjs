import { readFileSync } from 'node:fs';

/**
 * A process by more than its number, which the kernel gives out again: the time it started (clock ticks since boot)
 * and the boot. Undefined when no such process runs (a zombie counts as not running).
 *
 * @returns {{ pid: number, startTicks: string, bootId: string } | undefined}
 */
export function identityOf(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The second field is the name in brackets and may hold spaces; state is the 1st and the start the 20th after it.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    if (fields[0] === 'Z' || fields[0] === 'X') return undefined;
    return {
      pid,
      startTicks: fields[19],
      bootId: readFileSync('/proc/sys/kernel/random/boot_id', 'utf8').trim(),
    };
  } catch {
    return undefined;
  }
}

/** Whether the very process that `identity` was taken from still runs. */
export function isRunning(identity) {
  if (!identity?.pid) return false;
  const now = identityOf(identity.pid);
  return now !== undefined && now.startTicks === identity.startTicks && now.bootId === identity.bootId;
}
