import { deflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import type { Place } from '@/lib/contracts/problem';
import { memorySource } from '@/lib/intake/memory-source';
import { openFile } from '@/lib/intake/readers/open-file';
import { element, int32s, makeMat5, matrix, packed } from './make-mat5';
import { allValues, refusalOf } from './support';

type Case = [name: string, bytes: () => Uint8Array, code: string, place?: Place];
const nested = (depth: number): Buffer => {
  let inner = matrix({ name: '' });
  for (let level = 0; level < depth; level++)
    inner = matrix({ name: level === depth - 1 ? 'x' : '', mxClass: 1, shape: [1, 1], parts: [inner] });
  return inner;
};
const struct = (names: Buffer, lengths: number, parts: Buffer[] = [matrix({ name: '' })]): Buffer =>
  matrix({ mxClass: 2, shape: [1, 1], parts: [element(5, int32s(lengths)), element(1, names), ...parts] });
const sparse = (rows: number[], starts: number[], shape = [4, 2]): Buffer =>
  matrix({
    mxClass: 5,
    shape,
    parts: [
      element(5, int32s(...rows)),
      element(5, int32s(...starts)),
      element(9, Buffer.from(Float64Array.from(rows, () => 1).buffer)),
    ],
  });

const cases: Case[] = [
  ['half of the header', () => makeMat5([]).slice(0, 60), 'mat5-truncated'],
  ['no variables', () => makeMat5([]), 'mat5-empty'],
  ['no byte order', () => makeMat5([matrix()], { mark: 'XX' }), 'mat5-endian'],
  ['another version', () => makeMat5([matrix()], { version: 0x0200 }), 'mat5-version'],
  ['half of a tag', () => makeMat5([matrix().subarray(0, 4)]), 'mat5-truncated'],
  [
    'an element that is longer than the file',
    () => makeMat5([matrix({ nBytes: 1 << 30 })]),
    'mat5-truncated',
  ],
  ['a top element that is no variable', () => makeMat5([element(9, Buffer.alloc(16))]), 'mat5-element'],
  [
    'a deflated element that is no array',
    () => makeMat5([packed(element(9, Buffer.alloc(16)))]),
    'mat5-element',
  ],
  [
    'a deflated stream of garbage',
    () => makeMat5([element(15, Buffer.alloc(64, 0xff), { padded: false })]),
    'mat5-inflate',
  ],
  [
    'a deflated stream cut short',
    () =>
      makeMat5([element(15, deflateSync(matrix({ shape: [200, 30] })).subarray(0, 30), { padded: false })]),
    'mat5-inflate',
  ],
  [
    'a deflated stream with a wrong checksum',
    () => {
      const stream = deflateSync(matrix());
      stream[stream.length - 1] ^= 1;
      return makeMat5([element(15, stream, { padded: false })]);
    },
    'mat5-inflate',
  ],
  [
    'a bomb of 80 MiB',
    () =>
      makeMat5([
        packed(matrix({ shape: [1, 80 * 1024 * 1024], parts: [element(2, Buffer.alloc(80 * 1024 * 1024))] })),
      ]),
    'mat5-bomb',
  ],
  [
    'values longer than the array',
    () => makeMat5([matrix({ parts: [element(2, Buffer.alloc(6), { nBytes: 5000 })] })]),
    'mat5-length',
  ],
  [
    'values fewer than the shape',
    () => makeMat5([matrix({ shape: [20, 30], parts: [element(2, Buffer.alloc(6))] })]),
    'mat5-size',
  ],
  [
    'values of an unknown type',
    () => makeMat5([matrix({ parts: [element(77, Buffer.alloc(6))] })]),
    'mat5-element',
  ],
  ['no values', () => makeMat5([matrix({ parts: [] })]), 'mat5-truncated'],
  ['a negative axis', () => makeMat5([matrix({ shape: [-2, 3] })]), 'mat5-shape'],
  ['one axis', () => makeMat5([matrix({ shape: [6] })]), 'mat5-shape'],
  ['a shape that overflows', () => makeMat5([matrix({ shape: [2 ** 30, 2 ** 30, 64] })]), 'mat5-shape'],
  ['flags of the wrong length', () => makeMat5([matrix({ before: element(6, int32s(9)) })]), 'mat5-length'],
  [
    'flags of the wrong type',
    () => makeMat5([matrix({ before: element(9, Buffer.alloc(8)) })]),
    'mat5-element',
  ],
  ['an unknown class', () => makeMat5([matrix({ mxClass: 0 })]), 'mat5-class'],
  ['a name of a megabyte', () => makeMat5([matrix({ name: 'x'.repeat(1 << 20) })]), 'mat5-length'],
  [
    'a short element that is too long',
    () =>
      makeMat5([
        matrix({
          before: Buffer.concat([
            element(6, int32s(9, 0)),
            element(5, int32s(2, 3)),
            Buffer.from([1, 0, 9, 0, 0, 0, 0, 0]),
          ]),
        }),
      ]),
    'mat5-element',
  ],
  ['two variables of one name', () => makeMat5([matrix(), matrix()]), 'mat5-duplicate-name', { path: 'x' }],
  ['cells nested 40 deep', () => makeMat5([nested(40)]), 'mat5-depth'],
  ['a million cells', () => makeMat5([matrix({ mxClass: 1, shape: [1000, 1000], parts: [] })]), 'mat5-nodes'],
  [
    'a cell longer than its array',
    () => makeMat5([matrix({ mxClass: 1, shape: [1, 1], parts: [matrix({ name: '', nBytes: 9000 })] })]),
    'mat5-length',
  ],
  [
    'a cell that is no array',
    () => makeMat5([matrix({ mxClass: 1, shape: [1, 1], parts: [element(2, Buffer.alloc(8))] })]),
    'mat5-element',
  ],
  ['field names of 0 bytes', () => makeMat5([struct(Buffer.from('a'), 0)]), 'mat5-fields'],
  ['field names of a gigabyte each', () => makeMat5([struct(Buffer.from('a'), 1 << 30)]), 'mat5-fields'],
  [
    'two fields of one name',
    () => makeMat5([struct(Buffer.from('a\0\0\0a\0\0\0'), 4, [matrix({ name: '' }), matrix({ name: '' })])]),
    'mat5-fields',
  ],
  ['sparse rows outside', () => makeMat5([sparse([0, 99], [0, 1, 2])]), 'mat5-sparse', { path: 'x' }],
  ['sparse columns that go back', () => makeMat5([sparse([0, 1], [2, 0, 2])]), 'mat5-sparse', { path: 'x' }],
  [
    'a sparse array of a terabyte',
    () => makeMat5([sparse([0], [0, 1, 1], [1 << 20, 1 << 20])]),
    'mat5-sparse',
    { path: 'x' },
  ],
  ['only complex numbers', () => makeMat5([matrix({ flags: 0x800 })]), 'mat5-empty'],
];

describe('hostile MAT files', () => {
  for (const [name, bytes, code, place = {}] of cases)
    it(`${name}: ${code}`, async () => {
      const refusal = await refusalOf(bytes());
      expect(refusal?.code).toBe(code);
      expect(refusal?.place).toEqual(place);
    });

  it('truncations at every byte are refused, none crashes', async () => {
    const whole = makeMat5([packed(matrix({ name: 'a' })), matrix({ name: 'b' })]);
    const first = 128 + packed(matrix({ name: 'a' })).length;
    for (let length = 1; length < whole.length; length++)
      if (length !== first) expect(await refusalOf(whole.slice(0, length)), `${length} bytes`).not.toBeNull();
  });
});

describe('MAT files that are read', () => {
  it('sparse, logical, text in cells and struct arrays', async () => {
    const text = (value: string): Buffer =>
      matrix({ name: '', mxClass: 4, shape: [1, value.length], parts: [element(16, Buffer.from(value))] });
    const cells = matrix({ name: 'areas', mxClass: 1, shape: [1, 2], parts: [text('MT'), text('V1')] });
    const trial = (value: number): Buffer =>
      matrix({ name: '', mxClass: 6, shape: [1, 1], parts: [element(2, Buffer.from([value]))] });
    const trials = matrix({
      name: 'trials',
      mxClass: 2,
      shape: [1, 3],
      parts: [
        element(5, int32s(8)),
        element(1, Buffer.from('__proto_speed\0\0\0'.slice(0, 8).padEnd(8, '\0'))),
        trial(7),
        trial(8),
        trial(9),
      ],
    });
    const file = await openFile(
      memorySource(
        makeMat5([
          sparse([0, 3, 1], [0, 2, 3]),
          matrix({ name: 'good', flags: 0x200, shape: [1, 3] }),
          cells,
          trials,
        ]),
      ),
    );
    expect(file.arrays.map(({ path, dtype, shape }) => [path, dtype, shape])).toEqual([
      ['x', 'float64', [4, 2]],
      ['good', 'bool', [1, 3]],
      ['areas{}', 'string', [2]],
      ['trials.__proto_', 'float64', [3]],
    ]);
    expect(await allValues(file.arrays[0])).toEqual([1, 0, 0, 1, 0, 1, 0, 0]);
    expect(await allValues(file.arrays[2])).toEqual(['MT', 'V1']);
    expect(await allValues(file.arrays[3])).toEqual([7, 8, 9]);
  });
});
