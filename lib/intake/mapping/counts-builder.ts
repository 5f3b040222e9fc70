import type { CountsArray } from '@/lib/intake/counts-array';
import type { Place, Problem } from '@/lib/contracts/problem';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';

const MAX_BYTES = 400 * 1024 * 1024;
const LARGEST = 2_147_483_647;

const faults = {
  'count-nan': {
    says: ['count is not a number (NaN)', 'counts are not numbers (NaN)'],
    remedy: 'Missing counts cannot be guessed: correct the export, or leave those trials out before sending.',
  },
  'count-infinite': {
    says: ['count is infinite', 'counts are infinite'],
    remedy: 'Correct the export: a count is a whole number from 0.',
  },
  'count-negative': {
    says: ['count is negative', 'counts are negative'],
    remedy: 'Send counts, not rates with the mean taken off; a count is never below 0.',
  },
  'count-fraction': {
    says: ['count is not a whole number', 'counts are not whole numbers'],
    remedy: 'Send spike counts, not rates or smoothed values.',
  },
  'count-absurd': {
    says: [`count is larger than ${LARGEST}`, `counts are larger than ${LARGEST}`],
    remedy: 'Check that the array holds spike counts.',
  },
} as const;
type FaultCode = keyof typeof faults;

/**
 * Collects spike counts, row-major trials × units × bins, widening from 8 to 16 to 32 bits as they need it. Values that
 * are no counts are tallied by kind with the first place of each.
 */
export class CountsBuilder {
  readonly shape: readonly [number, number, number];
  #counts: CountsArray;
  #limit = 0xff;
  readonly #tally = new Map<FaultCode, { times: number; place: Place }>();

  constructor(shape: readonly [number, number, number], place: Place) {
    const cells = shape[0] * shape[1] * shape[2];
    if (cells === 0)
      throw new IntakeRefusal(
        'counts-empty',
        `The counts are ${shape.join(' × ')}: there is nothing in them.`,
        'Check which array holds the counts.',
        place,
      );
    if (cells > MAX_BYTES)
      throw new IntakeRefusal(
        'counts-too-many',
        `The counts are ${shape.join(' × ')}, ${cells} cells; at most ${MAX_BYTES} are taken in one session.`,
        'Use wider bins, or split the recording into sessions.',
        place,
      );
    this.shape = shape;
    this.#counts = new Uint8Array(cells);
  }

  get counts(): CountsArray {
    return this.#counts;
  }

  /** Puts one value at a cell; `place` adds what the caller knows (line and column of a text file). */
  set(cell: number, value: number, place?: Place): void {
    if (value >= 0 && value <= this.#limit && Number.isInteger(value)) {
      this.#counts[cell] = value;
      return;
    }
    if (value > this.#limit && value <= LARGEST && Number.isInteger(value)) {
      this.#widen(value);
      this.#counts[cell] = value;
      return;
    }
    const code: FaultCode = Number.isNaN(value)
      ? 'count-nan'
      : !Number.isFinite(value)
        ? 'count-infinite'
        : value < 0
          ? 'count-negative'
          : Number.isInteger(value)
            ? 'count-absurd'
            : 'count-fraction';
    const seen = this.#tally.get(code);
    if (seen) seen.times += 1;
    else this.#tally.set(code, { times: 1, place: { ...this.#cellPlace(cell), ...place } });
  }

  problems(place: Place): Problem[] {
    const cells = this.#counts.length;
    return [...this.#tally].map(([code, { times, place: first }]) => ({
      code,
      severity: 'stops',
      message:
        times === 1
          ? `1 ${faults[code].says[0]}.`
          : `${times} of ${cells} ${faults[code].says[1]}; the first place is given.`,
      remedy: faults[code].remedy,
      place: { ...place, ...first },
    }));
  }

  #cellPlace(cell: number): Place {
    const [, nUnits, nBins] = this.shape;
    return {
      trial: Math.floor(cell / (nUnits * nBins)),
      unit: Math.floor(cell / nBins) % nUnits,
      bin: cell % nBins,
    };
  }

  #widen(value: number): void {
    const bytes = value <= 0xffff ? 2 : 4;
    if (this.#counts.length * bytes > MAX_BYTES)
      throw new IntakeRefusal(
        'counts-too-many',
        `The counts need ${bytes} bytes each for ${this.shape.join(' × ')} cells, more than one session may take.`,
        'Use wider bins, or split the recording into sessions.',
      );
    this.#counts = bytes === 2 ? Uint16Array.from(this.#counts) : Int32Array.from(this.#counts);
    this.#limit = bytes === 2 ? 0xffff : LARGEST;
  }
}
