/** Training and held-out features after scaling by training trials alone. */
export interface Standardised {
  nTrain: number;
  nTest: number;
  /** Features with variance on the training trials; the others are dropped in this fold. */
  p: number;
  kept: Int32Array;
  mean: Float64Array;
  sd: Float64Array;
  /** nTrain × p and nTest × p, row-major. */
  zTrain: Float64Array;
  zTest: Float64Array;
}

/**
 * Takes rows of `x` (any number × p, row-major), z-scores each feature with the mean and the 1/n standard deviation of
 * the training rows, z = (x − m)/s, and drops features that do not vary on the training rows. `scaling` 'none' only
 * subtracts the mean. `xTest`, where given, supplies the held-out rows instead of `x` (same shape).
 * A feature counts as constant when its deviation is within rounding of its size (max|x|·n·2⁻⁵²).
 * Nothing passed in is changed. Cost O((nTrain + nTest)·p).
 */
export function standardise(
  x: Float64Array,
  p: number,
  train: Int32Array,
  test: Int32Array,
  scaling: 'unit' | 'none' = 'unit',
  xTest: Float64Array = x,
): Standardised {
  const nTrain = train.length;
  const means = new Float64Array(p);
  const squares = new Float64Array(p);
  const largest = new Float64Array(p);
  for (const row of train) {
    const at = row * p;
    for (let j = 0; j < p; j++) {
      means[j] += x[at + j];
      const size = Math.abs(x[at + j]);
      if (size > largest[j]) largest[j] = size;
    }
  }
  for (let j = 0; j < p; j++) means[j] /= nTrain;
  for (const row of train) {
    const at = row * p;
    for (let j = 0; j < p; j++) squares[j] += (x[at + j] - means[j]) ** 2;
  }
  const keptList: number[] = [];
  for (let j = 0; j < p; j++) {
    if (Math.sqrt(squares[j] / nTrain) > largest[j] * nTrain * 2 ** -52) keptList.push(j);
  }
  const kept = Int32Array.from(keptList);
  const mean = Float64Array.from(kept, (j) => means[j]);
  const sd = Float64Array.from(kept, (j) => (scaling === 'unit' ? Math.sqrt(squares[j] / nTrain) : 1));
  const scale = (source: Float64Array, rows: Int32Array): Float64Array => {
    const z = new Float64Array(rows.length * kept.length);
    let out = 0;
    for (const row of rows) {
      const at = row * p;
      for (let j = 0; j < kept.length; j++) z[out++] = (source[at + kept[j]] - mean[j]) / sd[j];
    }
    return z;
  };
  return {
    nTrain,
    nTest: test.length,
    p: kept.length,
    kept,
    mean,
    sd,
    zTrain: scale(x, train),
    zTest: scale(xTest, test),
  };
}
