import type { CountsAxis, CountsSource, IntakeProposal } from '@/lib/contracts/intake';
import { columnName, columnRole } from '@/lib/intake/proposal/column-role';
import { arraysOf, columnLength, longColumns, rowLengths } from '@/lib/intake/proposal/row-lengths';
import type { OfferedArray, OfferedFile } from '@/lib/intake/proposal/offered-file';

type Question = IntakeProposal['questions'][number];

export interface CountsProposal {
  counts?: CountsSource;
  questions: Question[];
  /** Lengths of the axes as far as they are known. */
  nTrials: number | null;
  nUnits: number | null;
}

/** Finds the spike counts among the files and tells their axes from the lengths of the tables; what stays open is asked. */
export function proposeCounts(files: readonly OfferedFile[]): CountsProposal {
  const asked = (question: string, options: string[], field = 'counts'): CountsProposal => ({
    questions: [{ field, question, options }],
    nTrials: null,
    nUnits: null,
  });
  const long = files.filter((file) => longColumns(file) !== null);
  const arrays = arraysOf(files).filter(isCountsLike);
  const named = arrays.filter((array) =>
    /count|spike/i.test(array.path === '' ? array.fileName : array.path),
  );
  const likely = named.length > 0 ? named : arrays.filter((array) => array.shape.length === 3);
  const candidates = likely.length > 0 ? likely : arrays;
  const options = [
    ...candidates.map(
      (array) =>
        `${array.fileName}${array.path === '' ? '' : `: ${array.path}`} (${array.shape.join(' × ')})`,
    ),
    ...long.map((file) => file.name),
  ];
  const spiking = files.filter((file) =>
    file.arrays.some((array) => /(?:^|[/.])spike_times_index$/.test(array.path)),
  );
  if (options.length === 0 && spiking.length === 1) return proposeSpikes(spiking[0], files);
  if (options.length === 0) return asked('No file holds an array of counts. Which file has them?', []);
  if (options.length > 1) return asked('Which of these are the spike counts?', options);
  if (candidates.length === 0) return proposeLong(long[0], files);
  const array = candidates[0];
  return /\{unit\}/.test(array.path) ? proposeWide(array, files) : proposeAxes(array, files);
}

/** Spike times need an event and a window, which only a person can name. */
function proposeSpikes(file: OfferedFile, files: readonly OfferedFile[]): CountsProposal {
  const lengths = rowLengths([file]);
  const events = arraysOf(files)
    .filter(
      (array) =>
        columnLength(array) !== null &&
        columnRole(array) === 'trial' &&
        /time|onset|start|stop/i.test(columnName(array)),
    )
    .map(columnName);
  return {
    questions: [
      {
        field: 'counts.spikeTimes',
        question: `${file.name} holds spike times. Around which event of the trials, and from when to when, are they to be cut into bins?`,
        options: events,
      },
    ],
    nTrials: lengths.trial.size === 1 ? [...lengths.trial][0] : null,
    nUnits: file.arrays.find((array) => /spike_times_index$/.test(array.path))?.shape[0] ?? null,
  };
}

/** Two or three axes longer than one, of numbers that can be counts. */
function isCountsLike(array: OfferedArray): boolean {
  if (array.dtype === 'string' || columnLength(array) !== null) return false;
  return array.shape.length === 2 || array.shape.length === 3;
}

function proposeWide(array: OfferedArray, files: readonly OfferedFile[]): CountsProposal {
  const file = files.find((one) => one.fileId === array.fileId);
  const trial = file?.arrays.find((one) => /^trial(?:[_ ]?(?:id|number))?$/i.test(one.path))?.path;
  return {
    counts: {
      fileId: array.fileId,
      wide: { ...(trial === undefined ? {} : { trial }), pattern: array.path },
    },
    questions: [],
    nTrials: array.shape[0],
    nUnits: array.shape[1],
  };
}

function proposeLong(file: OfferedFile, files: readonly OfferedFile[]): CountsProposal {
  const columns = longColumns(file);
  if (columns === null) throw new Error('the table is not in the long form');
  const lengths = rowLengths(files);
  return {
    counts: { fileId: file.fileId, long: columns },
    questions: [
      {
        field: 'counts.long.shape',
        question:
          'How many trials, units and bins are there? The table leaves out zeros, so silent ones at the end cannot be seen.',
        options: [],
      },
    ],
    nTrials: lengths.trial.size === 1 ? [...lengths.trial][0] : null,
    nUnits: lengths.unit.size === 1 ? [...lengths.unit][0] : null,
  };
}

function proposeAxes(array: OfferedArray, files: readonly OfferedFile[]): CountsProposal {
  const lengths = rowLengths(files);
  const names: CountsAxis[] = array.shape.length === 3 ? ['trial', 'unit', 'bin'] : ['trial', 'unit'];
  const orders = permutations(names).filter((order) =>
    order.every((axis, at) => {
      const known = lengths[axis];
      return known.size === 0 || known.has(array.shape[at]);
    }),
  );
  const words = (order: CountsAxis[]): string =>
    order.map((axis, at) => `${axis} (${array.shape[at]})`).join(' × ');
  const source = { fileId: array.fileId, path: array.path };
  if (orders.length !== 1)
    return {
      questions: [
        {
          field: 'counts.axes',
          question:
            orders.length === 0
              ? `No order of the axes of ${array.path || array.fileName} (${array.shape.join(' × ')}) fits the lengths of the tables. What are its axes?`
              : `What are the axes of ${array.path || array.fileName} (${array.shape.join(' × ')})? The lengths of the tables do not settle it.`,
          options: (orders.length === 0 ? permutations(names) : orders).map(words),
        },
      ],
      nTrials: lengths.trial.size === 1 ? [...lengths.trial][0] : null,
      nUnits: lengths.unit.size === 1 ? [...lengths.unit][0] : null,
    };
  const axes = orders[0];
  return {
    counts: { ...source, axes },
    questions: [],
    nTrials: array.shape[axes.indexOf('trial')],
    nUnits: array.shape[axes.indexOf('unit')],
  };
}

function permutations<T>(items: readonly T[]): T[][] {
  if (items.length <= 1) return [[...items]];
  return items.flatMap((item, at) =>
    permutations([...items.slice(0, at), ...items.slice(at + 1)]).map((rest) => [item, ...rest]),
  );
}
