import { tableFromArrays, tableToIPC, vectorFromArray, Utf8, Struct, Field, Int32 } from 'apache-arrow';
import { describe, expect, it } from 'vitest';
import { memorySource } from '@/lib/intake/memory-source';
import { inspectFile } from '@/lib/intake/inspect-file';
import { openFile } from '@/lib/intake/readers/open-file';
import { allValues, fixture, refusalOf } from './support';

const text = (content: string): Uint8Array => new TextEncoder().encode(content);

describe('hostile JSON files', () => {
  it.each<[string, string, string]>([
    ['a list that ends early', '[{"a": 1}, {"a": 2', 'json-structure'],
    ['a word', '{"a": nonsense}', 'json-structure'],
    ['a trailing comma', '{"a": [1,]}', 'json-structure'],
    ['an empty object', '{}', 'json-empty'],
    ['an empty list', '[]', 'json-empty'],
    ['an object without arrays', '{"a": "b"}', 'json-empty'],
    ['entries that are no records', '[1, 2, 3]', 'json-record'],
    ['a record among numbers', '[{"a": 1}, 2]', 'json-record'],
    ['fields of two types', '[{"a": 1}, {"a": "x"}]', 'json-mixed'],
    ['a field that is a record', '[{"a": {"b": 1}}]', 'json-mixed'],
    ['ragged lists', '{"counts": [[1, 2], [3]]}', 'json-ragged'],
    ['a number among lists', '{"counts": [[1, 2], 3]}', 'json-ragged'],
    ['text in a nested list', '{"counts": [[1, 2], [3, "x"]]}', 'json-mixed'],
    ['lists nested 20 deep', `{"a": ${'['.repeat(20)}1${']'.repeat(20)}}`, 'json-depth'],
    ['a hundred thousand brackets', `{"a": ${'['.repeat(100_000)}`, 'json-structure'],
  ])('%s: %s', async (_, content, code) => {
    expect((await refusalOf(text(content)))?.code).toBe(code);
  });

  it('bytes that are not UTF-8 are refused', async () => {
    expect((await refusalOf(Uint8Array.from([...text('{"a": ["'), 0xff, ...text('"]}')])))?.code).toBe(
      'json-encoding',
    );
  });

  it('records and arrays are read; __proto__ stays a name; missing is not 0', async () => {
    const records = await openFile(
      memorySource(text('[{"__proto__": 1, "b": "x"}, {"__proto__": 2, "b": null}, {"b": "z"}]')),
    );
    expect(records.arrays.map(({ path, dtype, shape }) => [path, dtype, shape])).toEqual([
      ['__proto__', 'float64', [3]],
      ['b', 'string', [3]],
    ]);
    expect(await allValues(records.arrays[0])).toEqual([1, 2, NaN]);
    const arrays = await openFile(
      memorySource(text('{"counts": [[[1, 2], [3, 4]]], "speed": [2.5], "bin_ms": 25}')),
    );
    expect(arrays.arrays.map(({ path, shape }) => [path, shape])).toEqual([
      ['counts', [1, 2, 2]],
      ['speed', [1]],
      ['bin_ms', []],
    ]);
    expect(await allValues(arrays.arrays[0])).toEqual([1, 2, 3, 4]);
  });
});

describe('hostile Arrow and Parquet files', () => {
  for (const name of [
    'arrow_file.arrow',
    'feather_zstd.feather',
    'pq_plain.parquet',
    'pq_zstd.parquet',
    'pq_nulls.parquet',
  ])
    it(
      `${name}: truncations and flipped bytes are read or refused, none crashes`,
      { timeout: 60_000 },
      async () => {
        const whole = fixture(`files/${name}`);
        const step = Math.max(1, Math.floor(whole.length / 60));
        for (let length = 8; length < whole.length; length += step)
          expect(await refusalOf(whole.slice(0, length)), `${length} bytes`).not.toBeNull();
        const codes = new Set<string>();
        for (let at = 6; at < whole.length; at += step) {
          const flipped = Uint8Array.from(whole);
          flipped[at] ^= 0xff;
          const refusal = await refusalOf(flipped);
          if (refusal) codes.add(refusal.code);
        }
        expect(codes.size).toBeGreaterThan(0);
      },
    );

  it('two columns of one name are refused, columns of other kinds left aside', async () => {
    const inner = new Field('x', new Int32());
    const nested = vectorFromArray([{ x: 1 }, { x: 2 }], new Struct([inner]));
    const table = tableFromArrays({ trial: Int32Array.from([0, 1]) }).assign(
      new (await import('apache-arrow')).Table({ nested, name: vectorFromArray(['a', 'b'], new Utf8()) }),
    );
    const found = await inspectFile(memorySource(Uint8Array.from(tableToIPC(table, 'file'))), 'f');
    expect(found.arrays.map((array) => array.path)).toEqual(['trial', 'name']);
    expect(found.problems).toMatchObject([{ code: 'arrow-left-aside', place: { path: 'nested' } }]);
    const none = tableToIPC(tableFromArrays({ trial: new Int32Array(0) }), 'file');
    expect((await refusalOf(Uint8Array.from(none)))?.code).toBe('arrow-empty');
  });
});
