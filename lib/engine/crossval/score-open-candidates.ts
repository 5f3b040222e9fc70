import type { Candidate } from '@/lib/engine/estimators/candidates';
import { scoreClosedForm } from '@/lib/engine/crossval/score-closed-form';
import type { SpectralFactor } from '@/lib/engine/estimators/spectral-factor';
import type { Linalg } from '@/lib/engine/linalg/port';

/**
 * Closed-form scores, in double precision, of the candidates that screening left open; Infinity elsewhere, and 0 for a
 * candidate that is alone. Labels with more than one open candidate are worked out candidate by candidate.
 *
 * `open` m × candidates flags. Returns m × candidates.
 */
export function scoreOpenCandidates(
  factor: SpectralFactor,
  candidates: Candidate[],
  weights: (Float64Array | null)[],
  residual: Float64Array,
  c: Float64Array,
  m: number,
  open: Uint8Array,
  linalg: Linalg,
): Float64Array {
  const { nTrain, r } = factor;
  const count = candidates.length;
  const scores = new Float64Array(m * count).fill(Infinity);
  const rowsOf: number[][] = candidates.map(() => []);
  for (let row = 0; row < m; row++) {
    const still: number[] = [];
    for (let l = 0; l < count; l++) if (open[row * count + l] === 1) still.push(l);
    if (still.length === 1) scores[row * count + still[0]] = 0;
    else for (const l of still) rowsOf[l].push(row);
  }
  rowsOf.forEach((rows, l) => {
    if (rows.length === 0) return;
    const part = new Float64Array(rows.length * nTrain);
    const partC = new Float64Array(rows.length * r);
    rows.forEach((row, at) => {
      part.set(residual.subarray(row * nTrain, (row + 1) * nTrain), at * nTrain);
      partC.set(c.subarray(row * r, (row + 1) * r), at * r);
    });
    const found = scoreClosedForm(factor, [candidates[l]], [weights[l]], part, partC, rows.length, linalg);
    rows.forEach((row, at) => (scores[row * count + l] = found[at]));
  });
  return scores;
}
