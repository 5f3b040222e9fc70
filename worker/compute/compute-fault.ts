import type { Problem } from '@/lib/contracts/problem';

/** The engine refused, in words that a person can read: an outcome of the readout, not a crash. */
export class ComputeFault extends Error {
  readonly problem: Problem;

  constructor(problem: Problem) {
    super(problem.message);
    this.name = 'ComputeFault';
    this.problem = problem;
  }
}
