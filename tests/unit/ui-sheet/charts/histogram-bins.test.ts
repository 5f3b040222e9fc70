import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { histogramBins } from '@/components/charts/histogram-bins';

describe('histogramBins', () => {
  it('counts every value once', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -2, max: 1, noNaN: true }), { minLength: 1, maxLength: 300 }),
        (values) => {
          const bins = histogramBins(values);
          expect(bins.reduce((sum, bin) => sum + bin.count, 0)).toBe(values.length);
        },
      ),
    );
  });

  it('puts a value on an edge into the bin that begins there', () => {
    const bins = histogramBins([0, 0.1, 0.2, 0.3], 3);
    expect(bins.map((bin) => bin.count)).toEqual([1, 1, 1, 1]);
  });

  it('gives nothing for nothing, and one bin for equal values', () => {
    expect(histogramBins([])).toEqual([]);
    expect(histogramBins([0.02, 0.02]).filter((bin) => bin.count > 0)).toHaveLength(1);
  });
});
