import { columnLength } from '@/lib/client/intake/column-length';
import type { IntakeDraft } from '@/lib/client/intake/intake-draft';
import { usedArrays, type UsedArray } from '@/lib/client/intake/used-arrays';
import type { StoredFile } from '@/lib/contracts/file';
import type { CountsAxis } from '@/lib/contracts/intake';

/** How long the used arrays are along each axis, row by row, and whether they agree. */
export interface MatchedLengths {
  rows: { name: string; lengths: Partial<Record<CountsAxis, number>> }[];
  axes: Record<CountsAxis, { lengths: number[]; verdict: 'agree' | 'differ' | 'one only' | 'none' }>;
}

const axisNames: CountsAxis[] = ['trial', 'unit', 'bin'];

/** Compares lengths along trials, units and bins as the draft maps them. Tables of long counts say nothing beforehand. */
export function matchLengths(draft: IntakeDraft, files: readonly StoredFile[]): MatchedLengths {
  const used = usedArrays(draft, files);
  const rows: MatchedLengths['rows'] = [];
  const counts = used.find(({ use }) => use.kind === 'counts');
  if (counts) rows.push({ name: 'counts', lengths: countsLengths(draft, counts) });
  const columns = (kind: 'trial' | 'unit' | 'label', name: string, axis: CountsAxis) => {
    const byLength = new Map<number, string[]>();
    for (const { array, use, name: column } of used) {
      const length = columnLength(array.shape);
      if (use.kind !== kind || length === null) continue;
      byLength.set(length, [...(byLength.get(length) ?? []), column]);
    }
    for (const [length, names] of byLength)
      rows.push({ name: `${name} ${namesInWords(names)}`, lengths: { [axis]: length } });
  };
  columns('label', 'label', 'trial');
  columns('trial', 'trial columns', 'trial');
  columns('unit', 'unit columns', 'unit');
  const axes = Object.fromEntries(
    axisNames.map((axis) => {
      const all = rows.flatMap((row) => row.lengths[axis] ?? []);
      const lengths = [...new Set(all)];
      const verdict =
        all.length === 0 ? 'none' : all.length === 1 ? 'one only' : lengths.length === 1 ? 'agree' : 'differ';
      return [axis, { lengths, verdict }];
    }),
  ) as MatchedLengths['axes'];
  return { rows, axes };
}

function countsLengths(draft: IntakeDraft, { array, file }: UsedArray): Partial<Record<CountsAxis, number>> {
  const fromFile: CountsAxis[] = file.format === 'csv' ? axisNames : draft.axes;
  const axes = array.shape.length === 2 ? fromFile.filter((axis) => axis !== 'bin') : fromFile;
  return Object.fromEntries(axes.map((axis, index) => [axis, array.shape[index]]));
}

function namesInWords(names: readonly string[]): string {
  return names.length <= 4
    ? names.join(', ')
    : `${names.slice(0, 3).join(', ')} and ${names.length - 3} more`;
}
