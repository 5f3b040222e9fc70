import type { Severity } from '@/lib/contracts/problem';

/** The shape of a severity: square stops, triangle warns, ring notes, tick fine. Always beside its word. */
export function SeverityMark({ severity }: { severity: Severity | 'fine' }) {
  return (
    <svg width="12" height="12" aria-hidden="true">
      {severity === 'stops' ? <rect x="1" y="1" width="10" height="10" fill="var(--madder)" /> : null}
      {severity === 'warns' ? <path d="M6 .5L12 11.5H0z" fill="var(--ochre)" /> : null}
      {severity === 'notes' ? (
        <circle cx="6" cy="6" r="4.6" fill="none" stroke="var(--ink-3)" strokeWidth="1.6" />
      ) : null}
      {severity === 'fine' ? (
        <path d="M1.2 6.6l3.2 3.4L11 2.4" fill="none" stroke="var(--verdigris)" strokeWidth="1.8" />
      ) : null}
    </svg>
  );
}
