import { columnLength } from '@/lib/client/intake/column-length';
import type { ArrayUse } from '@/lib/client/intake/array-use';
import type { ArrayFact, FileFormat } from '@/lib/contracts/file';

/** One choice of the "use as" list: its value for a select, its words, and what it means. */
export interface UseOption {
  value: string;
  text: string;
  use: ArrayUse;
}

const unused: UseOption = { value: 'unused', text: 'not used', use: { kind: 'unused' } };
const counts: UseOption = { value: 'counts', text: 'spike counts', use: { kind: 'counts' } };
const numeric: UseOption[] = [
  { value: 'label nominal', text: 'label, nominal', use: { kind: 'label', labelKind: 'nominal' } },
  { value: 'label realised', text: 'label, realised', use: { kind: 'label', labelKind: 'realised' } },
  { value: 'label other', text: 'label, other', use: { kind: 'label', labelKind: 'other' } },
  { value: 'trial number', text: 'trial column, number', use: { kind: 'trial', type: 'number' } },
];
const category: UseOption = {
  value: 'trial category',
  text: 'trial column, category',
  use: { kind: 'trial', type: 'category' },
};
const angles: UseOption[] = [360, 180].map((periodDeg) => ({
  value: `trial circular ${periodDeg}`,
  text: `trial column, angle of ${periodDeg}°`,
  use: { kind: 'trial', type: 'circular', periodDeg },
}));
const unitNumber: UseOption = {
  value: 'unit number',
  text: 'unit column, number',
  use: { kind: 'unit', type: 'number' },
};
const unitCategory: UseOption = {
  value: 'unit category',
  text: 'unit column, category',
  use: { kind: 'unit', type: 'category' },
};
const long: UseOption[] = (['trial', 'unit', 'bin', 'count'] as const).map((role) => ({
  value: `long ${role}`,
  text: role === 'count' ? 'counts, one a row' : `the row’s ${role}`,
  use: { kind: 'long', role },
}));

/** What an array of this type and shape can be used as. A list of one ("not used") means that there is no choice. */
export function listUses(array: ArrayFact, format: FileFormat | null): UseOption[] {
  const length = columnLength(array.shape);
  if (array.dtype === 'string') return length === null ? [unused] : [category, unitCategory, unused];
  const canBeCounts = array.shape.length === 2 || array.shape.length === 3;
  return [
    ...(canBeCounts ? [counts] : []),
    ...(length === null ? [] : [...numeric, category, ...angles, unitNumber, unitCategory]),
    ...(length !== null && format === 'csv' ? long : []),
    unused,
  ];
}
