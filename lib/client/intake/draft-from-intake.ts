import { arrayKey } from '@/lib/client/intake/array-key';
import { columnName } from '@/lib/client/intake/column-name';
import { columnLength } from '@/lib/client/intake/column-length';
import type { ArrayUse } from '@/lib/client/intake/array-use';
import type { IntakeDraft } from '@/lib/client/intake/intake-draft';
import type { StoredFile } from '@/lib/contracts/file';
import type { CountsAxis, Intake, TableSource } from '@/lib/contracts/intake';

const defaultAxes: CountsAxis[] = ['trial', 'unit', 'bin'];

/** Turns a proposed or earlier mapping into a draft that can be changed array by array. */
export function draftFromIntake(intake: Partial<Intake>, files: readonly StoredFile[]): IntakeDraft {
  const uses: Record<string, ArrayUse> = {};
  const names: Record<string, string> = {};
  const fileOf = (id: string) => files.find((file) => file.id === id);

  const takeTable = (source: TableSource | undefined, kind: 'trial' | 'unit') => {
    const file = source && fileOf(source.fileId);
    if (!source || !file) return;
    const columns = source.columns ?? ownColumns(file);
    for (const [name, column] of Object.entries(columns)) {
      const path = typeof column === 'string' ? column : column.path;
      const type = typeof column === 'string' ? 'number' : column.type;
      const key = arrayKey(file.id, path);
      const periodDeg = typeof column === 'string' ? undefined : column.periodDeg;
      uses[key] = { kind, type, ...(type === 'circular' ? { periodDeg: periodDeg ?? 360 } : {}) };
      if (name !== columnName(path, file.name)) names[key] = name;
      if (kind !== 'trial') continue;
      const label = intake.labels?.find((candidate) => 'column' in candidate && candidate.column === name);
      if (label && 'column' in label) uses[key] = { kind: 'label', labelKind: label.kind };
    }
  };
  takeTable(intake.units, 'unit');
  takeTable(intake.trials, 'trial');

  const { counts } = intake;
  if (counts && 'axes' in counts) uses[arrayKey(counts.fileId, counts.path)] = { kind: 'counts' };
  if (counts && 'wide' in counts) uses[arrayKey(counts.fileId, counts.wide.pattern)] = { kind: 'counts' };
  if (counts && 'long' in counts)
    for (const role of ['trial', 'unit', 'bin', 'count'] as const)
      uses[arrayKey(counts.fileId, counts.long[role])] = { kind: 'long', role };

  const longShape = counts && 'long' in counts ? counts.long.shape : undefined;
  return {
    uses,
    names,
    axes: counts && 'axes' in counts ? [...counts.axes] : [...defaultAxes],
    binWidthMs: intake.binWidthMs ?? null,
    windowStartMs: intake.windowStartMs ?? null,
    base:
      counts && 'wide' in counts
        ? counts.wide.base
        : counts && 'long' in counts
          ? counts.long.base
          : undefined,
    longShape: {
      trial: longShape?.[0] ?? null,
      unit: longShape?.[1] ?? null,
      bin: longShape?.[2] ?? null,
    },
    wideTrial: counts && 'wide' in counts ? counts.wide.trial : undefined,
    derivedLabels: (intake.labels ?? []).filter((label) => !('column' in label)),
    stimulus: intake.stimulus,
  };
}

function ownColumns(file: StoredFile): NonNullable<TableSource['columns']> {
  return Object.fromEntries(
    file.arrays
      .filter((array) => columnLength(array.shape) !== null)
      .map((array) => [
        array.path,
        { path: array.path, type: array.dtype === 'string' ? 'category' : 'number' },
      ]),
  );
}
