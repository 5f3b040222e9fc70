import { EngineError } from '@/lib/engine/engine-error';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';
import type { InversePower } from '@/lib/engine/plan/inverse-power';

/**
 * Inverse-power learning curve through scores at several sizes (trials or units).
 *
 * Minimises Σ w (y − a + b·s^(−c))² over a ≤ `highest`, b ≥ 0 and c in [0.1, 3]: for each c the line in s^(−c) is solved in closed form;
 * c by a grid of 60 and golden-section refinement. Where scores do not rise with size the curve is flat at their weighted mean.
 * Shapes: `sizes` m ≥ 3 distinct positive; `scores` m; `weights` m positive (equal if left out; 1/variance is right).
 * Mutates nothing. Throws EngineError for fewer than 3 distinct sizes or bad values. Cost: about 120 passes over m.
 * Source: Cortes, Jackel, Solla, Vapnik & Denker, NIPS 1993 (the curve; from memory).
 */
export function fitInversePower(
  sizes: ArrayLike<number>,
  scores: ArrayLike<number>,
  weights?: ArrayLike<number>,
  highest = 1,
): InversePower {
  const m = sizes.length;
  requireNumbers('A size', sizes);
  requireNumbers('A score', scores, m);
  if (weights) requireNumbers('A weight', weights, m);
  for (let i = 0; i < m; i += 1) {
    if (!(sizes[i] > 0) || (weights && !(weights[i] > 0))) {
      throw new EngineError('invalidOption', `Size ${sizes[i]} or its weight is not positive`);
    }
  }
  if (new Set(Array.from(sizes)).size < 3) {
    throw new EngineError('notEstimable', 'A learning curve needs scores at 3 different sizes or more');
  }
  const weightOf = (i: number): number => (weights ? weights[i] : 1);
  const solve = (rate: number): InversePower => solveAtRate(sizes, scores, weightOf, rate, highest);
  const rates = Array.from({ length: 60 }, (_, g) => 0.1 * 30 ** (g / 59));
  let best = 0;
  const fits = rates.map(solve);
  fits.forEach((fit, g) => {
    if (fit.residualSd < fits[best].residualSd) best = g;
  });
  let low = Math.log(rates[Math.max(0, best - 1)]);
  let high = Math.log(rates[Math.min(rates.length - 1, best + 1)]);
  const golden = (Math.sqrt(5) - 1) / 2;
  for (let step = 0; step < 60; step += 1) {
    const left = high - golden * (high - low);
    const right = low + golden * (high - low);
    if (solve(Math.exp(left)).residualSd <= solve(Math.exp(right)).residualSd) high = right;
    else low = left;
  }
  const refined = solve(Math.exp((low + high) / 2));
  return refined.residualSd <= fits[best].residualSd ? refined : fits[best];
}

function solveAtRate(
  sizes: ArrayLike<number>,
  scores: ArrayLike<number>,
  weightOf: (i: number) => number,
  rate: number,
  highest: number,
): InversePower {
  const m = sizes.length;
  let least = Infinity;
  for (let i = 0; i < m; i += 1) least = Math.min(least, sizes[i]);
  // (size/least)^(−c) lies in (0, 1], whatever the rate.
  const x = Array.from({ length: m }, (_, i) => (sizes[i] / least) ** -rate);
  let total = 0;
  let mx = 0;
  let my = 0;
  for (let i = 0; i < m; i += 1) {
    total += weightOf(i);
    mx += weightOf(i) * x[i];
    my += weightOf(i) * scores[i];
  }
  mx /= total;
  my /= total;
  let sxx = 0;
  let sxy = 0;
  let aboveCap = 0;
  let crossCap = 0;
  for (let i = 0; i < m; i += 1) {
    sxx += weightOf(i) * (x[i] - mx) ** 2;
    sxy += weightOf(i) * (x[i] - mx) * (scores[i] - my);
    aboveCap += weightOf(i) * x[i] * x[i];
    crossCap += weightOf(i) * x[i] * (highest - scores[i]);
  }
  let drop = sxx > 0 ? -sxy / sxx : 0;
  let asymptote = my + drop * mx;
  if (!(drop > 0)) {
    drop = 0;
    asymptote = my;
  } else if (asymptote > highest) {
    // At the cap only the drop is free.
    asymptote = highest;
    drop = Math.max(0, crossCap / aboveCap);
  }
  let squares = 0;
  for (let i = 0; i < m; i += 1) squares += weightOf(i) * (scores[i] - asymptote + drop * x[i]) ** 2;
  return {
    asymptote,
    drop: drop * least ** rate,
    rate,
    isFlat: drop === 0,
    residualSd: Math.sqrt(squares / total),
  };
}
