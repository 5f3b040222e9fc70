/** Scores within this relative distance of the best count as equal to it. */
const TIE = 1e-12;

/**
 * The candidate with the smallest score; among those within 1e-12 of it (relative) the simplest, which comes first
 * (larger penalty, fewer components). Scores that are not finite are passed over; with none left the simplest is taken.
 * `scores` from `at`, `count` of them.
 */
export function pickCandidate(scores: Float64Array, at: number, count: number): number {
  let best = Infinity;
  for (let l = 0; l < count; l++) if (scores[at + l] < best) best = scores[at + l];
  if (best === Infinity) return 0;
  const bar = best + TIE * Math.abs(best);
  for (let l = 0; l < count; l++) if (scores[at + l] <= bar) return l;
  return 0;
}
