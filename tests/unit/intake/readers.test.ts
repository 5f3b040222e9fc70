import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { memorySource } from '@/lib/intake/memory-source';
import { openFile } from '@/lib/intake/readers/open-file';
import { allValues, fixture } from './support';

// tests/fixtures/files/manifest.json was written beside the sample files by numpy: shapes, types, exact sums, cells.
interface Facts {
  dtype: string;
  shape: number[];
  sum: string;
  sumsq: string;
  exact: boolean;
  nonfinite?: number;
  cells: { index: number[]; value: string }[];
}
const manifest = JSON.parse(
  readFileSync(new URL('../../fixtures/files/manifest.json', import.meta.url), 'utf8'),
) as { files: Record<string, { format: string; arrays: Record<string, Facts>; fortran?: boolean }> };

const words: Record<string, string> = {
  '|u1': 'uint8',
  '<u2': 'uint16',
  '|i1': 'int8',
  '<i2': 'int16',
  '<u4': 'uint32',
  '<f4': 'float32',
  '<i4': 'int32',
  '>u4': 'uint32',
  '<f2': 'float16',
  '<f8': 'float64',
  '<i8': 'int64',
};
const formats = new Set(['npy', 'npz', 'csv', 'mat5', 'mat73', 'hdf5', 'nwb', 'arrow', 'parquet']);

describe('sample files', () => {
  for (const [name, expected] of Object.entries(manifest.files)) {
    if (!formats.has(expected.format) || name === 'mat4.mat') continue;
    it(`${name} has the shape, type and sums of its manifest`, async () => {
      const file = await openFile(memorySource(fixture(`files/${name}`)));
      expect(file.format).toBe(expected.format);
      for (const [path, facts] of Object.entries(expected.arrays)) {
        if (path.startsWith('binned_counts')) continue; // in spike-times.test.ts
        const key =
          expected.format === 'csv' && path === 'counts' ? 'u{unit}_b{bin}' : path.replace('(null->nan)', '');
        const array = file.arrays.find((one) => one.path === key)!;
        expect(array, path).toBeDefined();
        expect(array.shape).toEqual(facts.shape);
        // The manifest widened the index when it was written; the file keeps it as uint32.
        if (path !== '/units/spike_times_index') expect(array.dtype).toBe(words[facts.dtype]);
        if (expected.fortran !== undefined) expect(array.order).toBe(expected.fortran ? 'F' : 'C');
        const values = await allValues(array);
        const at = (index: number[]): number => {
          const axes =
            array.order === 'C' ? index.map((_, i) => i) : index.map((_, i) => index.length - 1 - i);
          return axes.reduce((position, axis) => position * array.shape[axis] + index[axis], 0);
        };
        for (const cell of facts.cells)
          expect(Number(values[at(cell.index)]), `${path} at ${cell.index.join()}`).toBe(Number(cell.value));
        if (facts.exact) {
          const exact = values.map((value) => BigInt(value));
          expect(String(exact.reduce((sum, value) => sum + value, 0n))).toBe(facts.sum);
          expect(String(exact.reduce((sum, value) => sum + value * value, 0n))).toBe(facts.sumsq);
        } else {
          const finite = values.map(Number).filter((value) => Number.isFinite(value));
          expect(values.length - finite.length).toBe(facts.nonfinite ?? 0);
          const sum = finite.reduce((total, value) => total + value, 0);
          const squares = finite.reduce((total, value) => total + value * value, 0);
          expect(Math.abs(sum - Number(facts.sum))).toBeLessThan(1e-9 * Math.abs(Number(facts.sum)) + 1e-12);
          expect(Math.abs(squares - Number(facts.sumsq))).toBeLessThan(1e-9 * Number(facts.sumsq) + 1e-12);
        }
      }
      file.close();
    });
  }
});

describe('text tables', () => {
  const open = (text: string) => openFile(memorySource(new TextEncoder().encode(text)));

  it('reads a byte-order mark, CRLF, quotes, tabs and a missing final newline', async () => {
    const file = await open('\ufefftrial\tname\tspeed\r\n0\t"a ""b""\tc"\t1e-3\r\n1\td\t-2.5E+1');
    expect(file.table!.header).toEqual(['trial', 'name', 'speed']);
    expect(file.arrays.map((array) => [array.path, array.dtype])).toEqual([
      ['trial', 'int64'],
      ['name', 'string'],
      ['speed', 'float64'],
    ]);
    expect(await allValues(file.arrays[1])).toEqual(['a "b"\tc', 'd']);
    expect(await allValues(file.arrays[2])).toEqual([0.001, -25]);
  });

  it('keeps a blank cell of a number column missing, never 0', async () => {
    const file = await open('trial,speed\n0,\n1,3\n\n\n');
    expect(file.table!.nRows).toBe(2);
    expect(file.arrays[1].dtype).toBe('float64');
    expect(await allValues(file.arrays[1])).toEqual([NaN, 3]);
  });

  it('names rows by the line on which they start, across line breaks in quotes', async () => {
    const file = await open('a,b\n"x\ny",1\nz,2\n');
    const lines: number[] = [];
    for await (const batch of file.table!.rows()) lines.push(...batch.map((row) => row.line));
    expect(lines).toEqual([2, 4]);
  });

  it('remarks on a number column with a stray word or a decimal comma', async () => {
    const stray = await open('trial,speed\n0,1\n1,2\n2,fast\n');
    expect(stray.problems).toMatchObject([
      { code: 'csv-mixed-column', severity: 'warns', place: { line: 4, column: 2 } },
    ]);
    const comma = await open('trial\tspeed\n0\t1\n1\t2\n2\t3,5\n');
    expect(comma.problems).toMatchObject([{ code: 'csv-decimal-comma', place: { line: 4, column: 2 } }]);
  });

  it('reads a table of many megabytes whole', async () => {
    const line = `${Array.from({ length: 40 }, (_, i) => i).join(',')}\n`;
    const header = `${Array.from({ length: 40 }, (_, i) => `c${i}`).join(',')}\n`;
    const file = await open(header + line.repeat(60_000));
    expect(file.table!.nRows).toBe(60_000);
    let sum = 0;
    for await (const chunk of file.arrays[39].chunks()) for (const value of chunk) sum += Number(value);
    expect(sum).toBe(39 * 60_000);
  });
});
