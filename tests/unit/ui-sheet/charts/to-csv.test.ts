import { parse } from 'csv-parse/sync';
import { describe, expect, it } from 'vitest';
import { toCsv } from '@/components/charts/to-csv';

// Read back with csv-parse, an independent reader of RFC 4180.
const read = (text: string): string[][] => parse(text);

describe('toCsv', () => {
  it('keeps full precision and leaves missing values empty', () => {
    const text = toCsv(
      [{ name: 'trial' }, { name: 'label', unit: 'deg/s' }],
      [
        [1, 0.1 + 0.2],
        [2, null],
        [3, Number.NaN],
      ],
    );
    expect(read(text)).toEqual([
      ['trial', 'label (deg/s)'],
      ['1', '0.30000000000000004'],
      ['2', ''],
      ['3', ''],
    ]);
    expect(text).toContain('\r\n');
  });

  it('quotes what needs quotes', () => {
    const cell = 'room light off, "again"\nand on';
    expect(read(toCsv([{ name: 'reason' }], [[cell]]))[1][0]).toBe(cell);
  });

  it('defuses text that a spreadsheet would run, not negative numbers', () => {
    const rows = read(
      toCsv(
        [{ name: '=name' }, { name: 'value' }],
        [
          ['=1+1', -0.5],
          ['@x', 1],
          ['-a', 2],
          ['+b', 3],
        ],
      ),
    );
    expect(rows.map((row) => row[0])).toEqual(["'=name", "'=1+1", "'@x", "'-a", "'+b"]);
    expect(rows[1][1]).toBe('-0.5');
  });
});
