/** Sums over a chunk's sessions; chunks add up in any order. */
export type Tally = Record<string, number>;

export type Add = (name: string, amount: number) => void;
