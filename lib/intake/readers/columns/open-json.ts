import type { ByteSource } from '@/lib/intake/byte-source';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { checkColumns } from '@/lib/intake/readers/columns/check-columns';
import { columnFile, type HeldColumn } from '@/lib/intake/readers/columns/column-file';
import { holdValues } from '@/lib/intake/readers/columns/hold-values';
import type { ReadableArray, ReadableFile } from '@/lib/intake/readers/readable-file';

const MAX_BYTES = 32 * 1024 * 1024;
const MAX_AXES = 6;

/**
 * Opens a JSON file: a list of records with the same fields, or an object of arrays (nested lists of one shape are arrays
 * of several axes).
 */
export async function openJson(source: ByteSource): Promise<ReadableFile> {
  if (source.sizeBytes > MAX_BYTES)
    throw new IntakeRefusal(
      'json-too-large',
      `The file has ${source.sizeBytes} bytes; JSON is read up to 32 MiB.`,
      'Send NPY, NPZ or CSV.',
    );
  let content: unknown;
  try {
    const text = new TextDecoder('utf-8', { fatal: true }).decode(await source.read(0, source.sizeBytes));
    content = JSON.parse(text);
  } catch (error) {
    const isText = error instanceof SyntaxError;
    throw new IntakeRefusal(
      isText ? 'json-structure' : 'json-encoding',
      isText
        ? `The file begins like JSON and is not: ${error.message.slice(0, 120)}.`
        : 'The file is not valid UTF-8.',
      'Write the file again.',
    );
  }
  if (Array.isArray(content)) return fromRecords(content);
  if (typeof content === 'object' && content !== null) return fromArrays(content);
  throw new IntakeRefusal(
    'json-shape',
    'The file holds a single value.',
    'Send a list of records, or an object of arrays.',
  );
}

function fromRecords(records: unknown[]): ReadableFile {
  const names = new Set<string>();
  records.forEach((record, row) => {
    if (typeof record !== 'object' || record === null || Array.isArray(record))
      throw new IntakeRefusal(
        'json-record',
        `Entry ${row + 1} of the list is not a record.`,
        'Send a list of records with the same fields.',
        { line: row + 1 },
      );
    for (const name of Object.keys(record)) names.add(name);
  });
  checkColumns('json', [...names], records.length);
  const columns = [...names].map((name): HeldColumn => {
    const held = holdValues(
      name,
      records.map((record) =>
        Object.hasOwn(record as object, name) ? (record as Record<string, unknown>)[name] : null,
      ),
    );
    if (held === null)
      throw new IntakeRefusal(
        'json-mixed',
        `Field “${name}” is a number in some records and something else in others.`,
        'Give each field one type.',
        { path: name },
      );
    return held;
  });
  return columnFile('json', columns);
}

function fromArrays(content: object): ReadableFile {
  const arrays: ReadableArray[] = [];
  for (const [path, value] of Object.entries(content)) {
    if (typeof value === 'number') arrays.push(numbers(path, [], [value]));
    else if (Array.isArray(value)) arrays.push(fromList(path, value));
  }
  if (arrays.length === 0)
    throw new IntakeRefusal(
      'json-empty',
      'The file holds no array.',
      'Send a list of records, or an object of arrays.',
    );
  return { format: 'json', arrays, problems: [], close: () => undefined };
}

function fromList(path: string, list: unknown[]): ReadableArray {
  const shape: number[] = [];
  for (let level: unknown = list; Array.isArray(level) && shape.length <= MAX_AXES; level = level[0])
    shape.push(level.length);
  if (shape.length === 1) {
    const held = holdValues(path, list);
    if (held === null)
      throw new IntakeRefusal(
        'json-mixed',
        `“${path}” holds values of more than one kind.`,
        'Give each array one type.',
        { path },
      );
    return columnFile('json', [held]).arrays[0];
  }
  if (shape.length > MAX_AXES)
    throw new IntakeRefusal(
      'json-depth',
      `“${path}” is nested more than ${MAX_AXES} deep.`,
      'Send an array of at most four axes.',
      { path },
    );
  const flat: number[] = [];
  const visit = (level: unknown, axis: number): void => {
    if (axis === shape.length) {
      if (level !== null && typeof level !== 'number')
        throw new IntakeRefusal(
          'json-mixed',
          `“${path}” holds something other than numbers.`,
          'Give each array one type.',
          { path },
        );
      flat.push(level ?? NaN);
      return;
    }
    if (!Array.isArray(level) || level.length !== shape[axis])
      throw new IntakeRefusal(
        'json-ragged',
        `The lists in “${path}” do not all have the same length.`,
        'Send an array of one shape.',
        { path },
      );
    for (const item of level) visit(item, axis + 1);
  };
  visit(list, 0);
  return numbers(path, shape, flat);
}

function numbers(path: string, shape: number[], values: number[]): ReadableArray {
  return {
    path,
    dtype: values.every((value) => Number.isSafeInteger(value)) ? 'int64' : 'float64',
    shape,
    order: 'C',
    async *chunks() {
      yield Float64Array.from(values);
    },
  };
}
