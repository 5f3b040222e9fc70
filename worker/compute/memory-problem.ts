import type { Problem } from '@/lib/contracts/problem';

/** Refuses, with the numbers, what would not fit; null where it fits. */
export function memoryProblem(neededBytes: number, maxBytes: number): Problem | null {
  if (neededBytes <= maxBytes) return null;
  return {
    code: 'too-large-for-memory',
    severity: 'stops',
    message: `This readout would need about ${gibibytes(neededBytes)} of memory, and a readout may use ${gibibytes(maxBytes)} here.`,
    remedy:
      'Use fewer units, a shorter window, window means instead of single bins, or fewer views and controls.',
    place: {},
  };
}

function gibibytes(bytes: number): string {
  const gib = bytes / 2 ** 30;
  return gib >= 10 ? `${Math.ceil(gib)} GiB` : `${(Math.ceil(gib * 10) / 10).toFixed(1)} GiB`;
}
