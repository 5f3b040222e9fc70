import type { Place, Problem } from '@/lib/contracts/problem';

/**
 * A file or mapping that cannot be used, with its fixed code, a sentence that says what and where, and what to do. A
 * reader throws it; it ends up as a problem that stops, never as a server error.
 */
export class IntakeRefusal extends Error {
  readonly code: string;
  readonly remedy: string;
  readonly place: Place;

  constructor(code: string, message: string, remedy: string, place: Place = {}) {
    super(message);
    this.name = 'IntakeRefusal';
    this.code = code;
    this.remedy = remedy;
    this.place = place;
  }

  /** The refusal as a problem; `place` adds what the reader did not know (the file's name). */
  toProblem(place: Place = {}): Problem {
    return {
      code: this.code,
      severity: 'stops',
      message: this.message,
      remedy: this.remedy,
      place: { ...place, ...this.place },
    };
  }
}
