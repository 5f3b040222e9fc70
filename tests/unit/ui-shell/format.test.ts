import { describe, expect, it } from 'vitest';
import { formatBytes } from '@/lib/format/format-bytes';
import { formatDate } from '@/lib/format/format-date';
import { formatDuration } from '@/lib/format/format-duration';
import { formatInstant } from '@/lib/format/format-instant';
import { formatInterval } from '@/lib/format/format-interval';
import { formatNumber } from '@/lib/format/format-number';
import { formatP } from '@/lib/format/format-p';
import { formatPlace } from '@/lib/format/format-place';
import { formatPlural } from '@/lib/format/format-plural';
import { formatShape } from '@/lib/format/format-shape';
import { formatValue } from '@/lib/format/format-value';

// The forms checked here are those that the design prescribes: no-break thousands, a real minus sign, [low, high], p with three decimals.
describe('numbers for people', () => {
  it('parts thousands with a no-break space and writes a real minus sign', () => {
    expect(formatNumber(-1234567.891, 2)).toBe('−1\u00a0234\u00a0567.89');
    expect(formatNumber(1000, 0)).toBe('1\u00a0000');
    expect(formatNumber(999, 0)).toBe('999');
  });
  it('loses the sign of what rounds to zero', () => {
    expect(formatNumber(-0.001, 2)).toBe('0.00');
    expect(formatNumber(-0, 1)).toBe('0.0');
  });
  it('writes an en dash for what cannot be worked out', () => {
    expect([null, undefined, Number.NaN, Infinity].map((value) => formatNumber(value))).toEqual([
      '–',
      '–',
      '–',
      '–',
    ]);
    expect(formatInterval(null)).toBe('–');
  });
  it('writes intervals in square brackets', () => {
    expect(formatInterval({ low: -0.0249, high: 0.5 })).toBe('[−0.02, 0.50]');
  });
  it('never writes a p of 0.000', () => {
    expect(formatP(0.0412)).toBe('0.041');
    expect(formatP(1)).toBe('1.000');
    expect(formatP(1 / 1001)).toBe('0.001');
    expect(formatP(1 / 10_001)).toBe('0.0001');
    expect(formatP(0.0005)).not.toBe('0.000');
  });
  it('keeps four significant digits and no trailing zeros in data cells', () => {
    expect([0, 8, 0.25, -12.3456, 1234567].map((value) => formatValue(value))).toEqual([
      '0',
      '8',
      '0.25',
      '−12.35',
      '1\u00a0234\u00a0567',
    ]);
  });
  it('counts with the right noun', () => {
    expect(formatPlural(1, 'trial')).toBe('1\u00a0trial');
    expect(formatPlural(0, 'study', 'studies')).toBe('0\u00a0studies');
  });
});

describe('units', () => {
  it('writes sizes in decimal units and never "1000 MB"', () => {
    expect([0, 999, 42_000, 184_000_000, 2_100_000_000, 999_600].map(formatBytes)).toEqual([
      '0\u00a0B',
      '999\u00a0B',
      '42\u00a0kB',
      '184\u00a0MB',
      '2.1\u00a0GB',
      '1.0\u00a0MB',
    ]);
  });
  it('writes durations without a carry such as "60 s" or "60 min"', () => {
    expect([0.34, 2.94, 9.96, 59.6, 185, 3599.7, 4320, 97_200].map(formatDuration)).toEqual([
      '340\u00a0ms',
      '2.9\u00a0s',
      '10\u00a0s',
      '1\u00a0min',
      '3\u00a0min 5\u00a0s',
      '1\u00a0h',
      '1\u00a0h 12\u00a0min',
      '1\u00a0d 3\u00a0h',
    ]);
  });
  it('writes days and times in UTC', () => {
    expect(formatDate('2026-05-14T23:59:59.000Z')).toBe('14 May 2026');
    expect(formatDate('2026-05-14T23:59:59-02:00')).toBe('15 May 2026');
    expect(formatInstant('2026-05-14T09:05:00Z')).toBe('14 May 2026, 09:05 UTC');
    expect(formatDate('soon')).toBe('soon');
  });
  it('counts trials, units and bins from 1 for people, lines as they are', () => {
    expect(formatPlace({ file: 'a.csv', line: 214, column: 'speed' })).toBe('a.csv · line 214, column speed');
    expect(formatPlace({ path: '/counts', trial: 0, unit: 41, bin: 7 })).toBe(
      '/counts · trial 1, unit 42, bin 8',
    );
    expect(formatPlace({})).toBe('');
  });
  it('writes shapes', () => {
    expect(formatShape([640, 60, 128])).toBe('640\u00a0×\u00a060\u00a0×\u00a0128');
    expect(formatShape([])).toBe('one value');
  });
});
