import { describe, expect, it } from 'vitest';
import { intraclassCorrelation } from '@/lib/engine/label/intraclass-correlation';
import { realisedFraction } from '@/lib/engine/label/realised-fraction';
import { check } from '@/tests/reference/stats/checks';

// Source: Shrout & Fleiss, Psychol. Bull. 1979, tables 2 and 4; recomputed by R 4.2.2 (psych 2.2.9). See checks.json.
const { inputs, expected } = check<
  { matrix: number[][] },
  Record<'MSB' | 'MSW' | 'MSJ' | 'MSE' | 'ICC11' | 'ICC31' | 'ICC1k' | 'ICC3k' | 'sigma2_between', number> & {
    CI95_ICC11: number[];
    published: Record<string, number>;
  }
>('icc-shrout-fleiss');
const flat = inputs.matrix.flat();

describe("Shrout & Fleiss's six targets and four judges", () => {
  const result = intraclassCorrelation(flat, 6, 4);
  it('mean squares', () => {
    expect(result?.meanSquareTargets).toBeCloseTo(expected.MSB, 9);
    expect(result?.meanSquareWithin).toBeCloseTo(expected.MSW, 9);
    expect(result?.meanSquareMeasures).toBeCloseTo(expected.MSJ, 9);
    expect(result?.meanSquareResidual).toBeCloseTo(expected.MSE, 9);
  });
  it('ICC(1) and ICC(3) of one and of four judges', () => {
    expect(result?.icc1).toBeCloseTo(expected.ICC11, 9);
    expect(result?.icc3).toBeCloseTo(expected.ICC31, 9);
    expect(result?.icc1Mean).toBeCloseTo(expected.ICC1k, 9);
    expect(result?.icc3Mean).toBeCloseTo(expected.ICC3k, 9);
    // Published to two digits, and cut rather than rounded there: .17, .71, .44, .91.
    expect(Math.abs((result?.icc1 ?? 9) - expected.published['ICC(1,1)'])).toBeLessThan(0.01);
    expect(Math.abs((result?.icc3 ?? 9) - expected.published['ICC(3,1)'])).toBeLessThan(0.01);
  });
  it('interval of ICC(1)', () => {
    expect(result?.icc1Interval?.low).toBeCloseTo(expected.CI95_ICC11[0], 8);
    expect(result?.icc1Interval?.high).toBeCloseTo(expected.CI95_ICC11[1], 8);
  });
});

describe('the label builder on the same table, judges as locations and targets as frames', () => {
  const shape = { nLocations: 4, nAxes: 1, nFrames: 6 };
  const velocity = [0, 1, 2, 3].flatMap((judge) => inputs.matrix.map((row) => row[judge]));
  it('axis centring is ICC(1), and its variance between targets', () => {
    const one = realisedFraction(velocity, shape, { centring: 'axis', phi: 0 });
    expect(one?.fraction).toBeCloseTo(expected.ICC11, 9);
    expect(one?.sharedVariance).toBeCloseTo(expected.sigma2_between, 9);
    expect(one?.interval?.low).toBeCloseTo(expected.CI95_ICC11[0], 8);
    expect(one?.interval?.high).toBeCloseTo(expected.CI95_ICC11[1], 8);
  });
  it('location centring is ICC(3)', () => {
    const three = realisedFraction(velocity, shape, { centring: 'location' });
    expect(three?.fraction).toBeCloseTo(expected.ICC31, 9);
    expect(three?.ownVariance).toBeCloseTo(expected.MSE, 9);
  });
});

describe('bounds that follow from the definition', () => {
  const { expected: bounds } = check<object, Record<string, number>>('icc-invariants');
  it('identical measures give 1, opposed ones −1/(k − 1)', () => {
    const identical = [1, 1, 1, 1, 2, 2, 2, 2, 5, 5, 5, 5];
    expect(intraclassCorrelation(identical, 3, 4)?.icc1).toBeCloseTo(bounds['identical columns'], 12);
    const opposed = [1, -1, 2, -2, 3, -3, 0.5, -0.5, 2, 1, -1, -2];
    expect(intraclassCorrelation(opposed, 3, 4)?.icc1).toBeCloseTo(
      bounds['columns summing to 0 in each row (k=4), zero row effect'],
      12,
    );
  });
  it('a constant added or a factor changes nothing', () => {
    const base = intraclassCorrelation(flat, 6, 4);
    for (const change of [(x: number) => x + 1000, (x: number) => -7 * x]) {
      const moved = intraclassCorrelation(flat.map(change), 6, 4);
      expect(moved?.icc1).toBeCloseTo(base?.icc1 ?? NaN, 11);
      expect(moved?.icc3).toBeCloseTo(base?.icc3 ?? NaN, 11);
    }
  });
});
