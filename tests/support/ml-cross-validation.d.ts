/** What the tests use of the package, which ships no types of its own. */
declare module 'ml-cross-validation' {
  export function getFolds(
    features: readonly unknown[],
    k?: number,
  ): { testIndex: number[]; trainIndex: number[] }[];
}
