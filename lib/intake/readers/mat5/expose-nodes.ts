import type { ElementType } from '@/lib/intake/readers/element-type';
import { decodeValues } from '@/lib/intake/readers/decode-values';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { MatNode, StoredValues } from '@/lib/intake/readers/mat5/mat5-nodes';
import { storedTypes } from '@/lib/intake/readers/mat5/mat5-types';
import { PullBytes } from '@/lib/intake/readers/pull-bytes';
import { toRowMajor } from '@/lib/intake/readers/to-row-major';
import type { ReadableArray, ValueChunk } from '@/lib/intake/readers/readable-file';

const MAX_CELLS_LISTED = 100;
const MAX_DENSE = 64 * 1024 * 1024;

/** How the values of one variable are read: a fresh stream of its bytes each time. */
export interface VariableBytes {
  open(): AsyncIterable<Uint8Array>;
  isLittle: boolean;
}

type Numbers = Extract<MatNode, { kind: 'numbers' }>;

/**
 * A variable's arrays by path: `name`, `name.field`; `name{}` for the cells of a cell array that are alike (the cells are
 * the first axis), `name.field` likewise over a struct array.
 */
export function exposeNodes(node: MatNode, path: string, bytes: VariableBytes): ReadableArray[] {
  switch (node.kind) {
    case 'other':
      return [];
    case 'numbers':
      return [
        {
          path,
          dtype: node.dtype,
          shape: node.shape,
          order: 'F',
          chunks: () => readNumbers(node, bytes, path),
        },
      ];
    case 'text':
      return [texts([node.text], path)];
    case 'sparse':
      return [exposeSparse(node, path, bytes)];
    case 'cell': {
      const all = stack(node.items, `${path}{}`, bytes);
      if (all !== null) return [all];
      return node.items
        .slice(0, MAX_CELLS_LISTED)
        .flatMap((item, at) => exposeNodes(item, `${path}{${at}}`, bytes));
    }
    case 'struct':
      return [...node.fields].flatMap(([field, items]) => {
        if (items.length === 1) return exposeNodes(items[0], `${path}.${field}`, bytes);
        const all = stack(items, `${path}.${field}`, bytes);
        return all === null ? [] : [all];
      });
  }
}

/** Several nodes as one array, if all are text, or numbers of one type and shape. */
function stack(items: readonly MatNode[], path: string, bytes: VariableBytes): ReadableArray | null {
  if (items.length === 0) return null;
  if (items.every((item) => item.kind === 'text'))
    return texts(
      items.map((item) => item.text),
      path,
    );
  const [first] = items;
  if (first.kind !== 'numbers') return null;
  const isAlike = (item: MatNode): item is Numbers =>
    item.kind === 'numbers' && item.dtype === first.dtype && item.shape.join() === first.shape.join();
  if (!items.every(isAlike)) return null;
  const inner =
    first.shape.length === 2 && first.shape.some((length) => length === 1)
      ? first.shape.filter((length) => length !== 1)
      : first.shape;
  return {
    path,
    dtype: first.dtype,
    shape: [items.length, ...inner],
    order: 'C',
    chunks: () => readStack(items, first.shape, bytes, path),
  };
}

function texts(values: string[], path: string): ReadableArray {
  return {
    path,
    dtype: 'string',
    shape: [values.length],
    order: 'C',
    async *chunks() {
      yield values;
    },
  };
}

function typeOf(values: StoredValues, bytes: VariableBytes): ElementType {
  const { dtype, itemBytes } = storedTypes[values.storedType];
  return { dtype, itemBytes, littleEndian: bytes.isLittle };
}

async function* readNumbers(
  node: Numbers,
  bytes: VariableBytes,
  path: string,
): AsyncGenerator<ValueChunk, void, undefined> {
  const pull = new PullBytes(bytes.open());
  try {
    yield* decodeValues(piecesOf(pull, node.values), typeOf(node.values, bytes), path);
  } finally {
    await pull.close();
  }
}

/** The bytes of one array's values; the stream may be used on afterwards, for values that lie further on. */
async function* piecesOf(pull: PullBytes, values: StoredValues): AsyncGenerator<Uint8Array, void, undefined> {
  if (!(await pull.skip(values.position - pull.position))) throw changed();
  for (let left = values.nBytes; left > 0;) {
    const piece = await pull.next(left);
    if (piece === null) throw changed();
    left -= piece.length;
    yield piece;
  }
}

async function* readStack(
  items: readonly Numbers[],
  shape: readonly number[],
  bytes: VariableBytes,
  path: string,
): AsyncGenerator<ValueChunk, void, undefined> {
  const pull = new PullBytes(bytes.open());
  try {
    for (const item of items) {
      const values: number[] | Float64Array = new Float64Array(
        shape.reduce((product, length) => product * length, 1),
      );
      let at = 0;
      for await (const chunk of decodeValues(piecesOf(pull, item.values), typeOf(item.values, bytes), path))
        for (const value of chunk) values[at++] = Number(value);
      yield toRowMajor(values, shape);
    }
  } finally {
    await pull.close();
  }
}

function exposeSparse(
  node: Extract<MatNode, { kind: 'sparse' }>,
  path: string,
  bytes: VariableBytes,
): ReadableArray {
  const [nRows, nColumns] = node.shape;
  if (node.shape.length !== 2 || nRows * nColumns > MAX_DENSE)
    throw new IntakeRefusal(
      'mat5-sparse',
      `The sparse array “${path}” is ${node.shape.join(' × ')}, too large to fill out.`,
      'Send it as a full array.',
      { path },
    );
  return {
    path,
    dtype: 'float64',
    shape: node.shape,
    order: 'F',
    async *chunks() {
      const pull = new PullBytes(bytes.open());
      const whole = async (values: StoredValues): Promise<Float64Array> => {
        const all: number[] = [];
        for await (const chunk of decodeValues(piecesOf(pull, values), typeOf(values, bytes), path))
          for (const value of chunk) all.push(Number(value));
        return Float64Array.from(all);
      };
      try {
        const rows = await whole(node.rows);
        const starts = await whole(node.columnStarts);
        const values = await whole(node.values);
        for (let column = 0; column < nColumns; column++) {
          const dense = new Float64Array(nRows);
          const [from, to] = [starts[column], starts[column + 1]];
          if (!(from >= 0 && to >= from && to <= Math.min(rows.length, values.length))) throw outside(path);
          for (let at = from; at < to; at++) {
            if (!(rows[at] >= 0 && rows[at] < nRows)) throw outside(path);
            dense[rows[at]] = values[at];
          }
          yield dense;
        }
      } finally {
        await pull.close();
      }
    },
  };
}

function outside(path: string): IntakeRefusal {
  return new IntakeRefusal(
    'mat5-sparse',
    `The sparse array “${path}” names places outside itself.`,
    'Save it again as a full array.',
    { path },
  );
}

function changed(): IntakeRefusal {
  return new IntakeRefusal(
    'mat5-truncated',
    'The file ended earlier than when it was opened.',
    'Send the file again.',
  );
}
