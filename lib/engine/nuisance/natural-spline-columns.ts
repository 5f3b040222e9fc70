/**
 * Natural cubic spline basis at one point, without the constant.
 *
 * With knots t₁ < … < t_K mapped to u = (x − t₁)/(t_K − t₁):
 * N₁ = u, N₁₊ₖ = dₖ(u) − d_{K−1}(u), k = 1…K − 2, d_k(u) = [(u − u_k)₊³ − (u − u_K)₊³]/(u_K − u_k).
 * K − 1 columns (5 knots: 4 df); linear beyond the outer knots.
 * Shapes: `knots` K ≥ 2 ascending and distinct → K − 1 values. Mutates nothing. Knots are assumed checked. Cost: O(K).
 * Source: Hastie, Tibshirani & Friedman, The Elements of Statistical Learning, 2nd ed., eq. 5.4–5.5.
 */
export function naturalSplineColumns(value: number, knots: readonly number[]): number[] {
  const count = knots.length;
  const first = knots[0];
  const span = knots[count - 1] - first;
  const u = (value - first) / span;
  const cube = (x: number): number => (x > 0 ? x * x * x : 0);
  const d = (k: number): number => {
    const knot = (knots[k] - first) / span;
    return (cube(u - knot) - cube(u - 1)) / (1 - knot);
  };
  const columns = [u];
  if (count > 2) {
    const last = d(count - 2);
    for (let k = 0; k < count - 2; k += 1) columns.push(d(k) - last);
  }
  return columns;
}
