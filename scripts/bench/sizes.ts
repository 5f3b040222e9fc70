/** One row of the speed table: n trials, p features, windows, label draws. */
export interface BenchSize {
  name: string;
  n: number;
  p: number;
  windows: number;
  draws: number;
  /** Permutations that the plain scikit-learn script is timed on before extrapolating to all. */
  sample: number;
  /** Label draws of the batched scikit-learn fit (fewer where its memory would not fit; extrapolated). */
  batchedDraws: number;
}

/** The sizes of the table. W is timed on 4 of its 60 windows by the Python halves, and on all of them by the engine. */
export const benchSizes: BenchSize[] = [
  { name: 'S', n: 400, p: 120, windows: 1, draws: 1000, sample: 40, batchedDraws: 1000 },
  { name: 'M', n: 1000, p: 500, windows: 1, draws: 1000, sample: 12, batchedDraws: 1000 },
  { name: 'W', n: 1000, p: 300, windows: 60, draws: 1000, sample: 16, batchedDraws: 1000 },
  { name: 'L', n: 2000, p: 2000, windows: 1, draws: 1000, sample: 3, batchedDraws: 250 },
  { name: 'XL', n: 1500, p: 15000, windows: 1, draws: 1000, sample: 3, batchedDraws: 250 },
];
