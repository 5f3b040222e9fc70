import type { SessionState } from '@/lib/contracts/session';

/** A session's state in words; coloured only where it waits for a person. */
export const sessionStateWords: Record<SessionState, { text: string; className: string }> = {
  empty: { text: 'no data yet', className: 'quiet' },
  checking: { text: 'being checked', className: 'say' },
  waiting: { text: 'waits for you', className: 'w-warn' },
  ready: { text: 'ready', className: 'say' },
  refused: { text: 'refused', className: 'w-not' },
};
