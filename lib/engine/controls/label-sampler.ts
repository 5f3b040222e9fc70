import { EngineError } from '@/lib/engine/engine-error';
import { shuffle } from '@/lib/engine/random/shuffle';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import type { NullSpec } from '@/lib/engine/readout/types';

/** Writes draw b of the shuffled labels (n values, by position) to `out` from `at` on. */
export type LabelSampler = (b: number, out: Float64Array, at: number) => void;

/**
 * Shuffled labels under a scheme. Draw b depends on seed, scheme and b alone, so that draws can be made anywhere.
 *
 * - free: y*[i] = y[π(i)], π uniform. within: the same inside each level of a column.
 * - groups: where `values` is constant in every group, the groups' values are permuted among groups; otherwise groups of
 *   equal size exchange their whole sequences (a group whose size no other has stays as it is).
 * - circularShift: y*[i] = y[(i + s) mod n], shifts s = 1…n−1 drawn without replacement over the draws.
 * - sessions: the label sequences of other sessions in the given order. given: y*[i] = y[permutation[b][i]].
 *
 * `values`: what is shuffled (n, by position; the label, or residuals for Freedman–Lane); `trials`: session trial of
 * each position, which `codes` are looked up by. Neither is changed. Cost O(n) a draw.
 * Throws EngineError for residuals under 'sessions', where they are not defined (`isResidual`).
 */
export function labelSampler(
  scheme: NullSpec,
  values: Float64Array,
  trials: Int32Array,
  seed: number,
  isResidual = false,
): LabelSampler {
  const n = values.length;
  switch (scheme.kind) {
    case 'none':
      return () => undefined;
    case 'free':
      return (b, out, at) => {
        out.set(values, at);
        shuffle(out.subarray(at, at + n), splitGenerator(seed, 'null', b));
      };
    case 'within': {
      const cells = cellsOf(Int32Array.from(trials, (trial) => scheme.codes[trial]));
      return (b, out, at) => {
        const generator = splitGenerator(seed, 'null', b);
        for (const cell of cells) {
          const moved = Float64Array.from(cell, (i) => values[i]);
          shuffle(moved, generator);
          cell.forEach((i, j) => (out[at + i] = moved[j]));
        }
      };
    }
    case 'groups': {
      const cells = cellsOf(Int32Array.from(trials, (trial) => scheme.codes[trial]));
      return isConstantWithin(cells, values)
        ? permuteGroupValues(cells, values, seed)
        : exchangeSequences(cells, values, seed);
    }
    case 'circularShift': {
      const shifts = Int32Array.from({ length: n - 1 }, (_, i) => i + 1);
      shuffle(shifts, splitGenerator(seed, 'shifts'));
      return (b, out, at) => {
        for (let i = 0; i < n; i++) out[at + i] = values[(i + shifts[b]) % n];
      };
    }
    case 'sessions':
      if (isResidual) {
        throw new EngineError(
          'invalidOption',
          'Label sequences of other sessions cannot stand in for this session’s residuals; use another scheme for this control.',
        );
      }
      return (b, out, at) => out.set(scheme.sequences[b].subarray(0, n), at);
    case 'given':
      return (b, out, at) => {
        const from = scheme.permutations[b];
        for (let i = 0; i < n; i++) out[at + i] = values[from[i]];
      };
  }
}

/** Positions of each code, in ascending order of code and position. */
export function cellsOf(codes: Int32Array): Int32Array[] {
  const cells = new Map<number, number[]>();
  codes.forEach((code, i) => {
    const cell = cells.get(code);
    if (cell === undefined) cells.set(code, [i]);
    else cell.push(i);
  });
  return [...cells.keys()].sort((a, b) => a - b).map((code) => Int32Array.from(cells.get(code) ?? []));
}

/** Whether every cell holds one value throughout. */
export function isConstantWithin(cells: Int32Array[], values: Float64Array): boolean {
  return cells.every((cell) => cell.every((i) => values[i] === values[cell[0]]));
}

function permuteGroupValues(cells: Int32Array[], values: Float64Array, seed: number): LabelSampler {
  return (b, out, at) => {
    const moved = Float64Array.from(cells, (cell) => values[cell[0]]);
    shuffle(moved, splitGenerator(seed, 'null', b));
    cells.forEach((cell, g) => cell.forEach((i) => (out[at + i] = moved[g])));
  };
}

function exchangeSequences(cells: Int32Array[], values: Float64Array, seed: number): LabelSampler {
  const bySize = new Map<number, Int32Array[]>();
  for (const cell of cells) {
    const same = bySize.get(cell.length);
    if (same === undefined) bySize.set(cell.length, [cell]);
    else same.push(cell);
  }
  return (b, out, at) => {
    const generator = splitGenerator(seed, 'null', b);
    for (const same of bySize.values()) {
      const from = Int32Array.from(same, (_, g) => g);
      shuffle(from, generator);
      same.forEach((cell, g) => cell.forEach((i, j) => (out[at + i] = values[same[from[g]][j]])));
    }
  };
}
