import type { Problem } from '@/lib/contracts/problem';
import type { ReaderLost } from '@/lib/services/intake/reader-lost';

const words = {
  time: {
    code: 'reading-too-long',
    message: 'Reading took longer than it may for a file of this size.',
    remedy: 'Check the file; if it is sound, split it, or send the arrays as NPY.',
  },
  memory: {
    code: 'reading-too-large',
    message: 'Reading needed more memory than it may.',
    remedy: 'Check the file; if it is sound, use wider bins or split it into sessions.',
  },
  crash: {
    code: 'reading-failed',
    message: 'The file could not be read: its reader gave up. This has been logged.',
    remedy: 'Export the file again; if it is refused again, send it in another format.',
  },
} as const;

/** What a member is told where a reader ended without an answer. */
export function lostProblem(lost: ReaderLost, fileName?: string): Problem {
  return {
    severity: 'stops',
    ...words[lost.reason],
    place: fileName === undefined ? {} : { file: fileName },
  };
}
