import type { IntakeDraft } from '@/lib/client/intake/intake-draft';
import { usedArrays, type UsedArray } from '@/lib/client/intake/used-arrays';
import type { StoredFile } from '@/lib/contracts/file';
import type { CountsSource, Intake, LabelSource, TableSource } from '@/lib/contracts/intake';

/** A draft as the service takes it; or what is still missing, each as a sentence that says what to do. */
export type DraftOutcome = { intake: Intake; missing: [] } | { intake: null; missing: string[] };

/** Builds the intake of a draft. Never guesses: whatever is not settled is named. */
export function intakeFromDraft(draft: IntakeDraft, files: readonly StoredFile[]): DraftOutcome {
  const used = usedArrays(draft, files);
  const missing: string[] = [];
  const counts = countsOf(draft, used, missing);
  const trials = tableOf(used, 'trial', missing);
  const units = tableOf(used, 'unit', missing);
  const labels: LabelSource[] = [
    ...used.flatMap(({ use, name }) => (use.kind === 'label' ? [{ column: name, kind: use.labelKind }] : [])),
    ...draft.derivedLabels,
  ];
  if (!trials)
    missing.push('Say which arrays are trial columns: a readout needs at least the label of each trial.');
  else if (labels.length === 0) missing.push('Say which trial column is the label.');
  const { binWidthMs, windowStartMs } = draft;
  if (binWidthMs === null || !(binWidthMs > 0)) missing.push('Give the width of a bin in ms.');
  if (windowStartMs === null || !Number.isFinite(windowStartMs))
    missing.push('Say when the first bin starts, in ms from the alignment event.');
  if (missing.length > 0 || !counts || !trials || binWidthMs === null || windowStartMs === null)
    return { intake: null, missing };
  return {
    missing: [],
    intake: {
      counts,
      binWidthMs,
      windowStartMs,
      trials,
      labels,
      ...(units ? { units } : {}),
      ...(draft.stimulus ? { stimulus: draft.stimulus } : {}),
      acceptWarnings: false,
    },
  };
}

function countsOf(draft: IntakeDraft, used: readonly UsedArray[], missing: string[]): CountsSource | null {
  const arrays = used.filter(({ use }) => use.kind === 'counts');
  const longs = used.filter(({ use }) => use.kind === 'long');
  if (arrays.length + (longs.length > 0 ? 1 : 0) > 1) {
    missing.push('More than one array is taken for the spike counts. Choose one.');
    return null;
  }
  if (longs.length > 0) return longOf(draft, longs, missing);
  const chosen = arrays.at(0);
  if (!chosen) {
    missing.push('Say which array holds the spike counts.');
    return null;
  }
  const fileId = chosen.file.id;
  const { path, shape } = chosen.array;
  if (chosen.file.format === 'csv')
    return {
      fileId,
      wide: {
        pattern: path,
        ...(draft.wideTrial ? { trial: draft.wideTrial } : {}),
        ...(draft.base === undefined ? {} : { base: draft.base }),
      },
    };
  // an array of two axes has one bin
  const axes = shape.length === 2 ? draft.axes.filter((axis) => axis !== 'bin') : draft.axes;
  return { fileId, path, axes };
}

function longOf(draft: IntakeDraft, longs: readonly UsedArray[], missing: string[]): CountsSource | null {
  const paths: Record<string, string> = {};
  for (const role of ['trial', 'unit', 'bin', 'count'] as const) {
    const named = longs.filter(({ use }) => use.kind === 'long' && use.role === role);
    if (named.length === 1) paths[role] = named[0].array.path;
    else missing.push(`Say which one column holds the row’s ${role}.`);
  }
  if (new Set(longs.map(({ file }) => file.id)).size > 1) {
    missing.push('The columns of the counts are of two files. Choose them from one.');
    return null;
  }
  const { trial, unit, bin, count } = paths;
  if (!trial || !unit || !bin || !count) return null;
  const shape = longShapeOf(draft, missing);
  return {
    fileId: longs[0].file.id,
    long: {
      trial,
      unit,
      bin,
      count,
      ...(shape ? { shape } : {}),
      ...(draft.base === undefined ? {} : { base: draft.base }),
    },
  };
}

function longShapeOf({ longShape }: IntakeDraft, missing: string[]): [number, number, number] | null {
  const numbers = [longShape.trial, longShape.unit, longShape.bin];
  if (numbers.every((number) => number === null)) return null;
  const [nTrials, nUnits, nBins] = numbers.map((number) => (Number.isInteger(number) ? number : null));
  if (nTrials && nUnits && nBins && nTrials > 0 && nUnits > 0 && nBins > 0) return [nTrials, nUnits, nBins];
  missing.push('Give the numbers of trials, units and bins as whole numbers, all three or none.');
  return null;
}

function tableOf(used: readonly UsedArray[], kind: 'trial' | 'unit', missing: string[]): TableSource | null {
  const columns = used.filter(({ use }) => use.kind === kind || (kind === 'trial' && use.kind === 'label'));
  const first = columns.at(0);
  if (!first) return null;
  const other = columns.find(({ file }) => file.id !== first.file.id);
  if (other) {
    missing.push(
      `The ${kind} columns are of ${first.file.name} and ${other.file.name}; a session takes them from one file. Set those of one to “not used”.`,
    );
    return null;
  }
  const named: NonNullable<TableSource['columns']> = {};
  for (const { array, use, name } of columns) {
    if (name in named) missing.push(`Two ${kind} columns are called ${name}. Set one to “not used”.`);
    if (use.kind === 'label') named[name] = { path: array.path, type: 'number' };
    if (use.kind === 'trial' || use.kind === 'unit')
      named[name] = {
        path: array.path,
        type: use.type,
        ...(use.type === 'circular' && use.periodDeg !== undefined ? { periodDeg: use.periodDeg } : {}),
      };
  }
  return { fileId: first.file.id, columns: named };
}
