/** Why an engine function refused: each is a statement about the data that a person can read. */
export type EngineErrorCode = 'shapeMismatch' | 'notFinite' | 'notEstimable' | 'invalidOption';

/** Where in the arrays the fault lies; indices count from 0. */
export interface EnginePlace {
  trial?: number;
  unit?: number;
  bin?: number;
  fold?: number;
  column?: string;
}

/**
 * An expected refusal of the engine ("fold 3 has 4 training trials at level 0.8"). It is a result to be shown,
 * never a crash: the callers turn it into a problem.
 */
export class EngineError extends Error {
  readonly code: EngineErrorCode;
  readonly place: EnginePlace;

  constructor(code: EngineErrorCode, message: string, place: EnginePlace = {}) {
    super(message);
    this.name = 'EngineError';
    this.code = code;
    this.place = place;
  }
}
