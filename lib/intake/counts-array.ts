/** Spike counts, row-major over trials × units × bins, in the narrowest type that holds them. */
export type CountsArray = Uint8Array | Uint16Array | Int32Array;
