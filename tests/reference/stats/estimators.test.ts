import { describe, expect, it } from 'vitest';
import type { EstimatorSpec } from '@/lib/engine/readout/types';
import { check, checkTable, norris } from '@/tests/reference/stats/checks';
import { coefficients, fitRows, leaveOneOut } from '@/tests/reference/stats/fit-rows';

// Every published number is read from tests/fixtures/checks/checks.json, which names its source and what verified it.
const leastSquares: EstimatorSpec = { kind: 'leastSquares' };
const ridge = (value: number): EstimatorSpec => ({ kind: 'ridge', penalty: { value } });
const pls = (value: number): EstimatorSpec => ({ kind: 'pls', components: { value } });

/** Digits that agree, NIST's log relative error. */
const digits = (found: number, certified: number): number =>
  found === certified ? 16 : -Math.log10(Math.abs(found / certified - 1));
const leastDigits = (found: number[], certified: number[]): number =>
  Math.min(...found.map((value, i) => digits(value, certified[i])));
const squares = (a: number[], b: number[]): number => a.reduce((sum, x, i) => sum + (x - b[i]) ** 2, 0);
const sdOf = (values: number[]): number => {
  const centre = values.reduce((a, b) => a + b) / values.length;
  return Math.sqrt(values.reduce((sum, x) => sum + (x - centre) ** 2, 0) / values.length);
};

describe('least squares on NIST StRD', () => {
  it('Longley: coefficients to 12 digits, residual sum of squares to 9', () => {
    const { inputs, expected } = check<{ rows: number[][] }, { B: number[]; RSS: number }>('ols-longley');
    const [x, y] = [inputs.rows.map((row) => row.slice(1)), inputs.rows.map((row) => row[0])];
    expect(leastDigits(coefficients(x, y, leastSquares), expected.B)).toBeGreaterThan(12);
    const [fitted] = fitRows(x, [y], x, leastSquares).predicted;
    expect(digits(squares(y, fitted), expected.RSS)).toBeGreaterThan(9);
  });
  it('Norris: coefficients to 11 digits', () => {
    const { x, y } = norris();
    const { expected } = check<object, { B: number[] }>('ols-norris');
    expect(
      leastDigits(
        coefficients(
          x.map((v) => [v]),
          y,
          leastSquares,
        ),
        expected.B,
      ),
    ).toBeGreaterThan(11);
  });
  const powers = Array.from({ length: 21 }, (_, x) => [1, 2, 3, 4, 5].map((k) => x ** k));
  it('Wampler 1 and 2: raw powers of degree 5, an exact fit', () => {
    const { expected } = check<object, { B1: number[]; B2: number[] }>('ols-wampler1-2');
    const y1 = powers.map((row) => row.reduce((sum, v) => sum + v, 1));
    const y2 = powers.map((row) => row.reduce((sum, v, k) => sum + v / 10 ** (k + 1), 1));
    expect(leastDigits(coefficients(powers, y1, leastSquares), expected.B1)).toBeGreaterThan(8);
    expect(leastDigits(coefficients(powers, y2, leastSquares), expected.B2)).toBeGreaterThan(8);
  });
  it('Wampler 3: the same with large residuals', () => {
    const { inputs, expected } = check<{ y: number[] }, { B: number[]; resid_sd: number }>('ols-wampler3');
    expect(leastDigits(coefficients(powers, inputs.y, leastSquares), expected.B)).toBeGreaterThan(8);
    const [fitted] = fitRows(powers, [inputs.y], powers, leastSquares).predicted;
    expect(digits(Math.sqrt(squares(inputs.y, fitted) / 15), expected.resid_sd)).toBeGreaterThan(9);
  });
});

describe('least squares on the stack loss data (Brownlee 1965; R 4.2.2)', () => {
  it('coefficients', () => {
    const { expected } = check<object, { B: number[] }>('ols-stackloss');
    const table = checkTable('stackloss.csv');
    const found = coefficients(
      table.map((row) => row.slice(0, 3)),
      table.map((row) => row[3]),
      leastSquares,
    );
    expect(leastDigits(found, expected.B)).toBeGreaterThan(9);
  });
});

describe("ridge on R's longley (MASS 7.3-58.2, lm.ridge's documentation example)", () => {
  const table = checkTable('longley_R.csv');
  const [x, y] = [table.map((row) => row.slice(1)), table.map((row) => row[0])];
  const { expected } = check<object, Record<string, number> & { 'B(.05)': number[] }>(
    'ridge-longley-lmridge',
  );
  it('coefficients at λ = .05', () => {
    expect(leastDigits(coefficients(x, y, ridge(0.05)), expected['B(.05)'])).toBeGreaterThan(8);
  });
  it('generalised cross-validation at λ = .05, from fitted values and the trace of the hat matrix', () => {
    // Labels eᵢ one by one give the hat matrix. lm.ridge leaves the intercept out of the trace.
    const unit = y.map((_, i) => y.map((_unused, j) => (i === j ? 1 : 0)));
    const { predicted } = fitRows(x, [y, ...unit], x, ridge(0.05));
    const trace = unit.reduce((sum, _, i) => sum + predicted[i + 1][i], 0) - 1;
    const score = squares(y, predicted[0]) / (16 - trace) ** 2;
    expect(digits(score, expected['GCV(.05) RSS/(n-tr)^2'])).toBeGreaterThan(8);
  });
  it('the choice by generalised cross-validation is the best of its grid, intercept counted', () => {
    const grid = { from: 1e-4, to: 1, count: 41 };
    const { penalty } = fitRows(x, [y], [x[0]], { kind: 'ridge', penalty: { choose: 'gcv', grid } });
    const unit = y.map((_, i) => y.map((_unused, j) => (i === j ? 1 : 0)));
    const penalties = Array.from({ length: 41 }, (_, g) => 1e-4 * 1e4 ** (g / 40));
    const scores = penalties.map((value) => {
      const { predicted } = fitRows(x, [y, ...unit], x, ridge(value));
      const trace = unit.reduce((sum, _, i) => sum + predicted[i + 1][i], 0);
      return squares(y, predicted[0]) / (16 - trace) ** 2;
    });
    expect(digits(penalty[0] ?? NaN, penalties[scores.indexOf(Math.min(...scores))])).toBeGreaterThan(9);
  });
  it('agrees with glmnet 4.1-6 once its scaling of the label is put in (Employed, λ·n/sd)', () => {
    const caveat = check<object, { coef: number[] }>('glmnet-caveat').expected;
    const employed = table.map((row) => row[6]);
    const others = table.map((row) => row.slice(0, 6));
    const found = coefficients(others, employed, ridge((16 * 0.5) / sdOf(employed))).slice(1);
    const standardised = found.map((b, j) => b * sdOf(others.map((row) => row[j])));
    expect(leastDigits(standardised.slice(0, 5), caveat.coef.slice(0, 5))).toBeGreaterThan(7);
    // The sixth value in checks.json, .8993933, is a slip: numpy's solve of the system that it names gives .89941328.
    expect(standardised[5]).toBeCloseTo(0.89941328, 8);
  });
});

describe('ridge on the diabetes data (Efron et al., Ann. Stat. 2004; scikit-learn 1.2.1 of Debian 12)', () => {
  // scikit-learn scales its columns to mean 0 and sum of squares 1 before the fit.
  const table = checkTable('diabetes.csv');
  const scaled = Array.from({ length: 10 }, (_, j) => {
    const column = table.map((row) => row[j]);
    const centre = column.reduce((a, b) => a + b) / column.length;
    const size = Math.sqrt(column.length) * sdOf(column);
    return column.map((v) => (v - centre) / size);
  });
  const x = table.map((_, i) => scaled.map((column) => column[i]));
  const y = table.map((row) => row[10]);
  const { expected } = check<object, Record<string, number> & Record<string, number[]>>('ridge-diabetes');
  const r2 = (estimator: EstimatorSpec): number => {
    const [fitted] = fitRows(x, [y], x, estimator, 'none').predicted;
    return (
      1 -
      squares(y, fitted) /
        squares(
          y,
          y.map(() => y.reduce((a, b) => a + b) / y.length),
        )
    );
  };
  it('coefficients and intercept at penalty 1, and of least squares', () => {
    const found = coefficients(x, y, ridge(1), 'none');
    expect(digits(found[0], expected.intercept)).toBeGreaterThan(8);
    expect(leastDigits(found.slice(1), expected['coef(alpha=1)'])).toBeGreaterThan(8);
    expect(
      leastDigits(coefficients(x, y, leastSquares, 'none').slice(1), expected['coef(0)']),
    ).toBeGreaterThan(8);
  });
  it('R² at penalties 1, .1 and 0', () => {
    expect(r2(ridge(1))).toBeCloseTo(expected['R2(1)'], 9);
    expect(r2(ridge(0.1))).toBeCloseTo(expected['R2(.1)'], 9);
    expect(r2(leastSquares)).toBeCloseTo(expected['R2(0)'], 9);
  });
});

describe('ridge on attitude, all 30 rows, z-scored with 1/n (Hastie, Tibshirani & Friedman eq. 3.50; Haufe et al. 2014)', () => {
  const table = checkTable('attitude.csv');
  const [x, y] = [table.map((row) => row.slice(1)), table.map((row) => row[0])];
  const { expected } = check<object, { edf: number; w_std: number[]; 'pattern_cov(Z,s)/var(s)': number[] }>(
    'edf',
  );
  it('effective degrees of freedom', () => {
    const unit = y.map((_, i) => y.map((_unused, j) => (i === j ? 1 : 0)));
    const { predicted } = fitRows(x, unit, x, ridge(10));
    expect(unit.reduce((sum, _, i) => sum + predicted[i][i], 0) - 1).toBeCloseTo(expected.edf, 9);
  });
  it('weights', () => {
    const found = coefficients(x, y, ridge(10)).slice(1);
    found.forEach((b, j) => expect(b * sdOf(x.map((row) => row[j]))).toBeCloseTo(expected.w_std[j], 9));
  });
});

describe('the gasoline spectra, rows 1–50, 401 columns (Mevik & Wehrens, J. Stat. Softw. 2007; r-cran-pls)', () => {
  const table = checkTable('gasoline.csv');
  const [x, y] = [table.map((row) => row.slice(1)), table.map((row) => row[0])];
  const [trainX, trainY] = [x.slice(0, 50), y.slice(0, 50)];
  const pls1 = check<
    object,
    { RMSEP_CV: number[]; published_CV: number[]; test_rows51_60_published: number[] }
  >('plsr-gasoline').expected;
  const rmse = (predicted: number[], label: number[]): number =>
    Math.sqrt(squares(predicted, label) / label.length);

  it.each([1, 3, 6, 10])(
    'partial least squares, %i components: leave-one-out error of the published table',
    (k) => {
      const error = rmse(leaveOneOut(trainX, trainY, pls(k), 'none'), trainY);
      expect(digits(error, pls1.RMSEP_CV[k])).toBeGreaterThan(7);
      expect(Math.abs(error - pls1.published_CV[k])).toBeLessThan(0.0006);
    },
  );
  it('partial least squares: error on rows 51–60 for 1 to 10 components', () => {
    for (let k = 1; k <= 10; k += 1) {
      const [predicted] = fitRows(trainX, [trainY], x.slice(50), pls(k), 'none').predicted;
      expect(Math.abs(rmse(predicted, y.slice(50)) - pls1.test_rows51_60_published[k])).toBeLessThan(0.00006);
    }
  });
  it('ridge with more columns than rows: leave-one-out error', () => {
    const { expected } = check<object, Record<string, number>>('ridge-dual');
    for (const [penalty, error] of Object.entries(expected)) {
      const predicted = leaveOneOut(trainX, trainY, ridge(Number(penalty)), 'none');
      expect(digits(rmse(predicted, trainY), error)).toBeGreaterThan(8);
    }
  });
});
