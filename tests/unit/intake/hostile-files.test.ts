import { deflateRawSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import type { Place } from '@/lib/contracts/problem';
import { memorySource } from '@/lib/intake/memory-source';
import { openFile } from '@/lib/intake/readers/open-file';
import { makeNpy } from './make-npy';
import { makeZip, type Member } from './make-zip';
import { allValues, refusalOf } from './support';

const text = (content: string): Uint8Array => new TextEncoder().encode(content);
const hex = (digits: string): Uint8Array => Uint8Array.from(Buffer.from(digits, 'hex'));
const join = (...parts: Uint8Array[]): Uint8Array => Uint8Array.from(Buffer.concat(parts));

type Case = [name: string, bytes: () => Uint8Array, code: string, place: Place];

async function expectRefusal(bytes: Uint8Array, code: string, place: Place): Promise<void> {
  const refusal = await refusalOf(bytes);
  expect(refusal?.code).toBe(code);
  expect(refusal?.place).toEqual(place);
  expect(refusal?.message.length).toBeGreaterThan(10);
  expect(refusal?.remedy.length).toBeGreaterThan(5);
}

const npy: Case[] = [
  ['the signature alone', () => makeNpy().slice(0, 6), 'npy-truncated', {}],
  ['half of the signature', () => makeNpy().slice(0, 3), 'npy-magic', {}],
  ['no header length', () => makeNpy().slice(0, 9), 'npy-truncated', {}],
  ['half of a version 2 header length', () => makeNpy({ version: [2, 0] }).slice(0, 11), 'npy-truncated', {}],
  ['half of the header', () => makeNpy().slice(0, 60), 'npy-truncated', {}],
  ['no data', () => makeNpy({ data: new Uint8Array(0) }), 'npy-truncated', {}],
  ['one byte of data too few', () => makeNpy({ data: new Uint8Array(23) }), 'npy-truncated', {}],
  ['one byte of data too many', () => makeNpy({ data: new Uint8Array(25) }), 'npy-trailing-bytes', {}],
  ['two arrays in one file', () => join(makeNpy(), makeNpy()), 'npy-trailing-bytes', {}],
  ['version 4', () => makeNpy({ version: [4, 0] }), 'npy-version', {}],
  ['version 1.7', () => makeNpy({ version: [1, 7] }), 'npy-version', {}],
  ['version 0', () => makeNpy({ version: [0, 0] }), 'npy-version', {}],
  [
    'a header that claims 4 GB',
    () => makeNpy({ version: [2, 0], headerBytes: 0xffffffff }),
    'npy-header-size',
    {},
  ],
  ['a header that claims 60 kB', () => makeNpy({ headerBytes: 60_000 }), 'npy-truncated', {}],
  ['a header that ends early', () => makeNpy({ headerBytes: 20 }), 'npy-header', {}],
  ['pickled objects', () => makeNpy({ descr: "'|O'" }), 'npy-pickle', {}],
  ['pickled objects with a size', () => makeNpy({ descr: "'|O8'" }), 'npy-pickle', {}],
  ['a structured array', () => makeNpy({ descr: "[('a', '<i4'), ('b', '<f8')]" }), 'npy-structured', {}],
  ['complex numbers', () => makeNpy({ descr: "'<c16'" }), 'npy-type', {}],
  ['times', () => makeNpy({ descr: "'<M8[ns]'" }), 'npy-type', {}],
  ['raw bytes', () => makeNpy({ descr: "'|V16'" }), 'npy-type', {}],
  ['a type that is a name of every object', () => makeNpy({ descr: "'constructor'" }), 'npy-type', {}],
  ['128-bit floats', () => makeNpy({ descr: "'<f16'" }), 'npy-type', {}],
  ['an escape in the type', () => makeNpy({ descr: "'<f8\\x00'" }), 'npy-header', {}],
  ['a negative axis', () => makeNpy({ shape: '(2, -3, 4)' }), 'npy-header', {}],
  ['an axis with a fraction', () => makeNpy({ shape: '(2.5,)' }), 'npy-header', {}],
  ['a shape that is a call', () => makeNpy({ shape: '(__import__("os").getpid(),)' }), 'npy-header', {}],
  ['a shape without brackets', () => makeNpy({ shape: '24' }), 'npy-header', {}],
  ['a bare number in brackets', () => makeNpy({ shape: '(24)' }), 'npy-header', {}],
  [
    'a shape whose product overflows 64 bits',
    () => makeNpy({ shape: '(4294967296, 4294967296, 16)' }),
    'npy-shape',
    {},
  ],
  [
    'a shape whose product wraps to 24',
    () => makeNpy({ shape: '(9223372036854775808, 2, 24)' }),
    'npy-shape',
    {},
  ],
  ['40 axes', () => makeNpy({ shape: `(${'1, '.repeat(40)})` }), 'npy-shape', {}],
  ['a petabyte claimed', () => makeNpy({ shape: '(1000000000000000,)' }), 'npy-truncated', {}],
  ['a key that is missing', () => makeNpy({ header: "{'descr': '|u1', 'shape': (24,)}" }), 'npy-header', {}],
  [
    'a key that comes twice',
    () => makeNpy({ header: "{'descr': '|u1', 'descr': '<f8', 'fortran_order': False, 'shape': (24,)}" }),
    'npy-header',
    {},
  ],
  [
    'a key too many',
    () => makeNpy({ header: "{'descr': '|u1', 'fortran_order': False, 'shape': (24,), 'x': 1}" }),
    'npy-header',
    {},
  ],
  [
    'a key __proto__',
    () => makeNpy({ header: "{'__proto__': '|u1', 'fortran_order': False, 'shape': (24,)}" }),
    'npy-header',
    {},
  ],
  ['fortran_order that is a number', () => makeNpy({ fortran: '1' }), 'npy-header', {}],
  ['a header that is no dictionary', () => makeNpy({ header: 'import os' }), 'npy-header', {}],
  [
    'a version 3 header that is not UTF-8',
    () => makeNpy({ version: [3, 0], header: "{'descr': '|u1" }).map((b, i) => (i === 15 ? 0xff : b)),
    'npy-header',
    {},
  ],
  [
    'text beyond Unicode',
    () => makeNpy({ descr: "'<U1'", shape: '(1,)', data: hex('ffffffff') }),
    'text-encoding',
    {},
  ],
];

const good = (): Uint8Array => makeNpy();
const zipOf = (...members: Member[]): Uint8Array => makeZip(members);
const at = (path: string): Place => ({ path });
const npz: Case[] = [
  ['an archive without members', () => makeZip([]), 'npz-empty', {}],
  [
    'only a member that is no array',
    () => zipOf({ name: 'readme.txt', data: text('hello') }),
    'npz-empty',
    {},
  ],
  ['a name that climbs', () => zipOf({ name: '../../etc/x.npy', data: good() }), 'zip-name', {}],
  ['an absolute name', () => zipOf({ name: '/etc/x.npy', data: good() }), 'zip-name', {}],
  ['a drive letter', () => zipOf({ name: 'C:/x.npy', data: good() }), 'zip-name', {}],
  ['a backslash', () => zipOf({ name: '..\\x.npy', data: good() }), 'zip-name', {}],
  ['a folder', () => zipOf({ name: 'a/x.npy', data: good() }), 'zip-name', at('a/x.npy')],
  ['a NUL in a name', () => zipOf({ name: 'a\0.npy', data: good() }), 'zip-name', at('a\0.npy')],
  ['an empty name', () => zipOf({ name: '', data: good() }), 'zip-name', at('')],
  [
    'a name of 400 letters',
    () => zipOf({ name: `${'a'.repeat(400)}.npy`, data: good() }),
    'zip-name',
    at(`${'a'.repeat(400)}.npy`),
  ],
  [
    'two members of one name',
    () => zipOf({ name: 'x.npy', data: good() }, { name: 'x.npy', data: good() }),
    'zip-duplicate-name',
    at('x.npy'),
  ],
  [
    'an encrypted member',
    () => zipOf({ name: 'x.npy', data: good(), flags: 0x801 }),
    'zip-encrypted',
    at('x.npy'),
  ],
  [
    'an unknown method',
    () => zipOf({ name: 'x.npy', data: good(), method: 14 }),
    'zip-compression',
    at('x.npy'),
  ],
  ['a wrong CRC-32, deflated', () => zipOf({ name: 'x.npy', data: good(), crc: 7 }), 'zip-crc', at('x')],
  [
    'a wrong CRC-32, stored',
    () => zipOf({ name: 'x.npy', data: good(), crc: 7, method: 0 }),
    'zip-crc',
    at('x'),
  ],
  [
    'a stream of garbage',
    () => zipOf({ name: 'x.npy', data: good(), packed: hex('ffffffffffffffff') }),
    'zip-inflate',
    at('x'),
  ],
  [
    'a stream cut short',
    () => zipOf({ name: 'x.npy', data: good(), packed: deflateRawSync(good()).subarray(0, 40) }),
    'zip-inflate',
    at('x'),
  ],
  [
    'more than the directory says',
    () => zipOf({ name: 'x.npy', data: good(), size: good().length - 8 }),
    'zip-size',
    at('x'),
  ],
  [
    'less than the directory says',
    () => zipOf({ name: 'x.npy', data: good(), size: good().length + 8 }),
    'zip-size',
    at('x'),
  ],
  [
    'a size that the NPY header does not need',
    () => zipOf({ name: 'x.npy', data: join(good(), new Uint8Array(4)) }),
    'npy-trailing-bytes',
    at('x'),
  ],
  [
    'a size that the NPY header exceeds',
    () => zipOf({ name: 'x.npy', data: good().slice(0, -4) }),
    'npy-truncated',
    at('x'),
  ],
  [
    'a pickle inside',
    () => zipOf({ name: 'good.npy', data: good() }, { name: 'x.npy', data: makeNpy({ descr: "'|O'" }) }),
    'npy-pickle',
    at('x'),
  ],
  [
    'a member named array that is text',
    () => zipOf({ name: 'x.npy', data: text('hello world, no array') }),
    'npy-magic',
    at('x'),
  ],
  ['an empty member', () => zipOf({ name: 'x.npy', data: new Uint8Array(0) }), 'npy-magic', at('x')],
  [
    'a bomb of 300 MiB in 300 kB',
    () =>
      zipOf({
        name: 'x.npy',
        data: good(),
        size: 300 * 1024 * 1024,
        packed: deflateRawSync(new Uint8Array(4 * 1024 * 1024)),
      }),
    'zip-bomb',
    at('x.npy'),
  ],
  [
    'members that share their bytes',
    () => {
      const one: Member = {
        name: 'a.npy',
        data: new Uint8Array(5000).map((_, i) => (i * 7919) % 251),
        method: 0,
      };
      return makeZip([
        one,
        ...['b', 'c', 'd'].map((name) => ({
          ...one,
          name: `${name}.npy`,
          packed: new Uint8Array(0),
          packedSize: 5000,
          size: 5000,
          offset: 0,
        })),
      ]);
    },
    'zip-overlap',
    at('b.npy'),
  ],
  [
    'a directory that lies outside',
    () => makeZip([{ name: 'x.npy', data: good() }], { directoryOffset: 0x7fffffff }),
    'zip-structure',
    {},
  ],
  [
    'a directory of garbage',
    () => makeZip([{ name: 'x.npy', data: good() }], { directoryOffset: 4 }),
    'zip-structure',
    {},
  ],
  [
    'more members than there are',
    () => makeZip([{ name: 'x.npy', data: good() }], { count: 40 }),
    'zip-structure',
    {},
  ],
  [
    'a local header that is elsewhere',
    () => zipOf({ name: 'x.npy', data: good(), offset: 11 }),
    'zip-structure',
    at('x'),
  ],
  ['no end record', () => zipOf({ name: 'x.npy', data: good() }).slice(0, -22), 'zip-structure', {}],
  ['the first half', () => zipOf({ name: 'x.npy', data: good() }).slice(0, 80), 'zip-structure', {}],
  [
    'an Excel workbook',
    () => zipOf({ name: '[Content_Types].xml', data: text('<x/>'), method: 0 }),
    'format-unknown',
    {},
  ],
];

const csv: Case[] = [
  ['no bytes', () => new Uint8Array(0), 'file-empty', {}],
  ['only blank lines', () => text('\n\n\n'), 'csv-empty', {}],
  ['a header alone', () => text('a,b\n'), 'csv-empty', { line: 1 }],
  ['a row too short', () => text('a,b,c\n1,2,3\n4,5\n'), 'csv-ragged', { line: 3, column: 2 }],
  ['a row too long', () => text('a,b\n1,2\n3,4,5\n'), 'csv-ragged', { line: 3, column: 3 }],
  ['a comma at the end of one row', () => text('a,b\n1,2,\n'), 'csv-ragged', { line: 2, column: 3 }],
  ['a blank line in the middle', () => text('a,b\n1,2\n\n3,4\n'), 'csv-ragged', { line: 3, column: 1 }],
  ['a ragged row after quotes', () => text('a,b\n"x, y",2\n"z",3,4\n'), 'csv-ragged', { line: 3, column: 3 }],
  ['two columns of one name', () => text('a,b,a\n1,2,3\n'), 'csv-header-duplicate', { line: 1, column: 3 }],
  [
    'two columns that differ in blanks only',
    () => text('a, a\n1,2\n'),
    'csv-header-duplicate',
    { line: 1, column: 2 },
  ],
  ['a column without a name', () => text('a,,c\n1,2,3\n'), 'csv-header-blank', { line: 1, column: 2 }],
  ['no header', () => text('1,2,3\n4,5,6\n'), 'csv-header-missing', { line: 1 }],
  ['semicolons', () => text('a;b\n0,5;1,5\n'), 'csv-semicolon', { line: 1 }],
  ['a quote that is never closed', () => text('a,b\n1,"x\n2,y\n3,z\n'), 'csv-quote', { line: 2 }],
  ['a quote in the middle of a cell', () => text('a,b\n1,2\n3,x"y\n'), 'csv-quote', { line: 3 }],
  ['text after a closing quote', () => text('a,b\n1,"x"y\n'), 'csv-quote', { line: 2 }],
  ['a NUL in a cell', () => text('a,b\n1,2\n3,\0\n'), 'csv-nul', { line: 3 }],
  [
    'a NUL in the header',
    () => text('a\0,b,c,d,e,f,g,h,i,j,k,l,m,n,o,p,q,r,s,t\n1,2\n'),
    'csv-nul',
    { line: 1 },
  ],
  ['Latin-1', () => join(text('name,b\nx,1\n'), hex('e9'), text(',2\n')), 'csv-encoding', { line: 3 }],
  [
    'an overlong encoding',
    () => join(text('name,b\n'), hex('c0af'), text(',2\n')),
    'csv-encoding',
    { line: 2 },
  ],
  [
    'half a surrogate',
    () => join(text('name,b\n'), hex('eda080'), text(',2\n')),
    'csv-encoding',
    { line: 2 },
  ],
  [
    'a character cut at the end',
    () => join(text('name,b\nx,1\ny,'), hex('e2 82'.replace(' ', ''))),
    'csv-encoding',
    { line: 3 },
  ],
  [
    'UTF-16, little endian',
    () => join(hex('fffe'), Uint8Array.from(Buffer.from('a,b\n1,2\n', 'utf16le'))),
    'csv-encoding',
    { line: 1 },
  ],
  [
    'UTF-16, big endian',
    () => join(hex('feff'), Uint8Array.from(Buffer.from('a,b\n1,2\n', 'utf16le').swap16())),
    'csv-encoding',
    { line: 1 },
  ],
];

const other: Case[] = [
  ['a gzip archive', () => hex('1f8b0800000000000003'), 'format-unknown', {}],
  ['a pickle', () => hex('80049521000000000000008c'), 'format-unknown', {}],
  ['a PDF', () => text('%PDF-1.7\nxxxxx'), 'format-unknown', {}],
  ['an old workbook', () => hex('d0cf11e0a1b11ae10000000000000000'), 'format-unknown', {}],
  [
    'random bytes',
    () => Uint8Array.from({ length: 3000 }, (_, i) => (i * 7919 + (i >> 3)) % 256),
    'format-unknown',
    {},
  ],
  [
    'a picture',
    () => hex('89504e470d0a1a0a0000000d4948445200000001000000010802000000'),
    'format-unknown',
    {},
  ],
];

for (const [title, cases] of Object.entries({ npy, npz, csv, other }))
  describe(`hostile ${title} files`, () => {
    for (const [name, bytes, code, place] of cases)
      it(`${name}: ${code}`, () => expectRefusal(bytes(), code, place));
  });

describe('hostile files that are read, and harmless', () => {
  it('truncations of an NPY array at every byte are refused, none crashes', async () => {
    const whole = makeNpy({ descr: "'<f8'", shape: '(3,)' });
    for (let length = 0; length < whole.length; length++) {
      const refusal = await refusalOf(whole.slice(0, length));
      expect(refusal, `${length} bytes`).not.toBeNull();
    }
  });

  it('truncations of an NPZ archive at every byte are refused, none crashes', async () => {
    const whole = makeZip([
      { name: 'a.npy', data: makeNpy() },
      { name: 'b.npy', data: makeNpy(), method: 0 },
    ]);
    for (let length = 0; length < whole.length; length++) {
      const refusal = await refusalOf(whole.slice(0, length));
      expect(refusal, `${length} bytes`).not.toBeNull();
    }
  });

  it('a bomb that its directory hides stops at the stated size', async () => {
    const bomb = makeZip([
      { name: 'x.npy', data: makeNpy(), packed: deflateRawSync(new Uint8Array(200 * 1024 * 1024)) },
    ]);
    const before = process.memoryUsage().rss;
    expect((await refusalOf(bomb))?.code).toMatch(/zip-size|npy-magic/);
    expect(process.memoryUsage().rss - before).toBeLessThan(100 * 1024 * 1024);
  });

  it('__proto__ and markup as names stay names', async () => {
    const zip = makeZip([
      { name: '__proto__.npy', data: makeNpy() },
      { name: '<img src=x onerror=alert(1)>.npy', data: makeNpy() },
    ]);
    const file = await openFile(memorySource(zip));
    expect(file.arrays.map((array) => array.path)).toEqual(['__proto__', '<img src=x onerror=alert(1)>']);
    const table = await openFile(memorySource(text('__proto__,constructor\n1,2\n3,4\n')));
    expect(await allValues(table.arrays[0])).toEqual([1, 3]);
    expect(({} as Record<string, unknown>).shape).toBeUndefined();
  });

  it('a formula is text', async () => {
    const file = await openFile(memorySource(text('name,b\n=1+cmd|A1,1\n')));
    expect(file.arrays[0].dtype).toBe('string');
  });
});
