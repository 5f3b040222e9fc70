import type { ArrayUse } from '@/lib/client/intake/array-use';

/** The select value of a use; the counterpart of UseOption.value. */
export function codeOfUse(use: ArrayUse): string {
  switch (use.kind) {
    case 'unused':
    case 'counts':
      return use.kind;
    case 'label':
      return `label ${use.labelKind}`;
    case 'long':
      return `long ${use.role}`;
    default:
      return use.type === 'circular'
        ? `${use.kind} circular ${use.periodDeg ?? 360}`
        : `${use.kind} ${use.type}`;
  }
}
