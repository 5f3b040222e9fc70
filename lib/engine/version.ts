/** Changes whenever a number that the engine gives could change. Part of every readout's record. */
export const engineVersion = '1.0.0';
