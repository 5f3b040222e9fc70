import type { Intake, IntakeProposal, TableSource } from '@/lib/contracts/intake';
import { columnName, columnRole } from '@/lib/intake/proposal/column-role';
import { isTable, type OfferedArray, type OfferedFile } from '@/lib/intake/proposal/offered-file';
import { proposeCounts } from '@/lib/intake/proposal/propose-counts';
import { proposeScalars } from '@/lib/intake/proposal/propose-scalars';
import { arraysOf, columnLength, isLongTable } from '@/lib/intake/proposal/row-lengths';

const CIRCULAR = /^(?:.*[_ ])?(?:direction|heading)(?:[_ ]?deg)?$/i;
const LABEL = /fraction|coherence/i;
const REALISED = /reali[sz]ed|actual|measured/i;
type ColumnSources = NonNullable<TableSource['columns']>;

/** A mapping as far as the files' facts settle it; what they leave open is asked and never guessed. */
export function proposeMapping(files: readonly OfferedFile[]): IntakeProposal {
  const counts = proposeCounts(files);
  const scalars = proposeScalars(files);
  const questions = [...counts.questions, ...scalars.questions];
  const countsPath = counts.counts !== undefined && 'path' in counts.counts ? counts.counts.path : null;
  const columns = arraysOf(files).filter(
    (array) =>
      columnLength(array) !== null && !(array.fileId === counts.counts?.fileId && array.path === countsPath),
  );
  const trials = proposeTable('trial', counts.nTrials, columns, files, questions);
  const units = proposeTable('unit', counts.nUnits, columns, files, []);
  const labels = proposeLabels(trials, questions);
  const intake: Partial<Intake> = {
    ...(counts.counts ? { counts: counts.counts } : {}),
    ...(scalars.binWidthMs === undefined ? {} : { binWidthMs: scalars.binWidthMs }),
    ...(scalars.windowStartMs === undefined ? {} : { windowStartMs: scalars.windowStartMs }),
    ...(trials ? { trials: { fileId: trials.fileId, columns: trials.columns } } : {}),
    ...(labels.length > 0 ? { labels } : {}),
    ...(units ? { units: { fileId: units.fileId, columns: units.columns } } : {}),
  };
  return { intake, questions };
}

/** A list of unequal lengths with its index beside it (spike times and alike): no column of one value a row. */
function isRagged(array: OfferedArray, all: readonly OfferedArray[]): boolean {
  if (array.path.endsWith('_index')) return true;
  return all.some((other) => other.fileId === array.fileId && other.path === `${array.path}_index`);
}

/** The columns of one table: those of the file that has most of the right length and kind. */
function proposeTable(
  role: 'trial' | 'unit',
  length: number | null,
  columns: readonly OfferedArray[],
  files: readonly OfferedFile[],
  questions: IntakeProposal['questions'],
): { fileId: string; columns: ColumnSources } | null {
  const other = role === 'trial' ? 'unit' : 'trial';
  const byFile = files
    .filter((file) => !isLongTable(file))
    .map((file) => {
      const own = columns.filter(
        (array) =>
          array.fileId === file.fileId &&
          (length === null || columnLength(array) === length) &&
          !isRagged(array, columns) &&
          fits(array, file),
      );
      return { file, own };
    })
    .filter(({ own }) => own.some((array) => columnRole(array) === role))
    .sort((a, b) => b.own.length - a.own.length);
  if (byFile.length === 0) {
    if (role === 'trial')
      questions.push({
        field: 'trials',
        question: 'Which file holds the trial table?',
        options: files.map((file) => file.name),
      });
    return null;
  }
  const { file, own } = byFile[0];
  if (byFile.length > 1 && byFile[1].own.length === own.length && role === 'trial') {
    questions.push({
      field: 'trials',
      question: 'Which file holds the trial table?',
      options: byFile.map((one) => one.file.name),
    });
    return null;
  }
  const sources: ColumnSources = {};
  for (const array of own) sources[nameOf(array, own)] = sourceOf(array);
  return { fileId: file.fileId, columns: sources };

  /** In a set of arrays each is judged by its name; the columns of a text table go together. */
  function fits(array: OfferedArray, file: OfferedFile): boolean {
    const said = columnRole(array);
    if (isTable(file.format))
      return role === 'unit'
        ? !columns.some((one) => one.fileId === file.fileId && columnRole(one) === 'trial')
        : true;
    return said !== other && said !== 'bin' && (said === role || length !== null);
  }
}

/** The short name, or the whole path where two columns of the table would share a name. */
function nameOf(array: OfferedArray, table: readonly OfferedArray[]): string {
  const name = columnName(array);
  const isShared = table.some((other) => other !== array && columnName(other) === name);
  // A text table's own names are kept as they are.
  return (isTable(array.format) || isShared ? array.path : name).slice(0, 120);
}

function sourceOf(array: OfferedArray): ColumnSources[string] {
  if (array.dtype === 'string') return { path: array.path, type: 'category' };
  const inDegrees = (array.sample ?? []).some((value) => Math.abs(Number(value)) > 7);
  return CIRCULAR.test(columnName(array)) && inDegrees
    ? { path: array.path, type: 'circular', periodDeg: 360 }
    : { path: array.path, type: 'number' };
}

function proposeLabels(
  trials: { columns: ColumnSources } | null,
  questions: IntakeProposal['questions'],
): Intake['labels'] {
  if (trials === null) return [];
  const numbers = Object.entries(trials.columns)
    .filter(([, source]) => typeof source === 'string' || source.type === 'number')
    .map(([name]) => name);
  const labelled = numbers.filter((name) => LABEL.test(name));
  const nominal = labelled.filter((name) => !REALISED.test(name));
  const realised = labelled.filter((name) => REALISED.test(name));
  if (nominal.length > 1 || realised.length > 1 || labelled.length === 0) {
    questions.push({
      field: 'labels',
      question: 'Which column is the label that the readout is to predict?',
      options: labelled.length > 0 ? labelled : numbers,
    });
    return [];
  }
  return [
    ...nominal.map((column) => ({ column, kind: 'nominal' as const })),
    ...realised.map((column) => ({ column, kind: 'realised' as const })),
  ];
}
