import type { CountsAxis } from '@/lib/contracts/intake';
import type { ColumnFact, LabelFact } from '@/lib/contracts/session';

/** What one array of a file is taken for. */
export type ArrayUse =
  | { kind: 'unused' }
  | { kind: 'counts' }
  | { kind: 'label'; labelKind: LabelFact['kind'] }
  | { kind: 'trial' | 'unit'; type: ColumnFact['type']; periodDeg?: number }
  /** A column of a table with one row a trial, unit and bin. */
  | { kind: 'long'; role: CountsAxis | 'count' };
