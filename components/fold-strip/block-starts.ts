/** First trials of blocks: where a block column changes its value; the first trial always begins one. */
export function blockStarts(values: readonly (string | number | null)[]): number[] {
  const starts: number[] = [];
  values.forEach((value, trial) => {
    if (trial === 0 || value !== values[trial - 1]) starts.push(trial);
  });
  return starts;
}
